import { describe, expect, it } from 'vitest';
import { isGsm7 } from './gsm7';
import { measureSms } from './sms-length';
import { PATIENT_SMS, STAFF_SMS, smsText } from './templates';
import { MESSAGE_LANGUAGES } from './templates/wording';
import { VISIT } from './testing/visit';

describe('names that a hospital chooses', () => {
	it.each([
		['a disease in the sender', { sender: 'The Heart Centre' }, 'Your hospital: your visit', 'East Gym'],
		['a specialty in the place', { place: 'Cardiac Rehab Gym' }, 'Saltmarsh General: ', 'the usual place'],
		['an accent that costs room', { place: 'Dún Áras' }, 'Saltmarsh General: ', ', Dun Aras.'],
		['letters the alphabet lacks', { place: 'Зал 2' }, 'Saltmarsh General: ', 'the usual place'],
		['a line break', { place: 'East\nGym' }, 'Saltmarsh General: ', ', East Gym.'],
		['nothing', { place: ' ' }, 'Saltmarsh General: ', 'the usual place']
	])('%s', (_, change, start, part) => {
		const text = smsText('visit-reminder', { ...VISIT, ...change, confirmed: false });
		expect(text.startsWith(start)).toBe(true);
		expect(text).toContain(part);
		expect(measureSms(text).segments).toBe(1);
	});

	it.each(Object.keys(PATIENT_SMS) as (keyof typeof PATIENT_SMS)[])(
		'%s fits one part with the longest names and number',
		(template) => {
			const fields = {
				...VISIT,
				sender: 'The Old Harbour and Saltmarsh General Hospital of the Western Islands',
				place: '[East Gym behind the second lift, ground floor, through the yellow doors at the end]',
				phone: '+353 (0)1 555 0100 0123',
				startsAt: Date.parse('2025-09-24T21:50:00Z'),
				confirmed: true,
				link: 'https://ropewalk.hospital.saltmarsh-county.example/p/q7Zr2LxV0aYd8KcM3nTfPw'
			};
			for (const language of MESSAGE_LANGUAGES) {
				const text = smsText(template, fields, language);
				expect(measureSms(text).segments).toBe(1);
				expect(isGsm7(text)).toBe(true);
				expect(text).toContain('The Old');
				expect(text).toContain('+353015550100');
			}
		}
	);
});

describe('staff', () => {
	const fields = {
		since: Date.parse('2025-03-31T13:05:00Z'),
		zone: 'Europe/Dublin',
		unit: 'Heron Unit for Observation after Long Nights, West Wing, second floor',
		bed: 'Window 12',
		grade: 'medium',
		link: 'https://ropewalk.hospital.saltmarsh-county.example/t/q7Zr2LxV0aYd8KcM3nTfPw',
		code: '482923',
		holder: 'physician'
	} as const;

	it.each(Object.keys(STAFF_SMS) as (keyof typeof STAFF_SMS)[])(
		'%s fits one part with the longest names',
		(template) => {
			const text = smsText(template, fields);
			expect(measureSms(text)).toMatchObject({ encoding: 'gsm7', segments: 1 });
		}
	);

	it('keeps bed, link and code whole', () => {
		const text = smsText('escalation', fields);
		expect(text).toBe(
			`Ropewalk MEDIUM: Heron Unit., bed Window 12. To take it open ${fields.link} or reply TAKE 482923`
		);
	});
});
