import { describe, expect, it } from 'vitest';
import { previewsOf } from './preview';
import { PATIENT_MAILS, PATIENT_SMS, STAFF_CALLS, STAFF_MAILS, STAFF_NOTICES, STAFF_SMS } from './templates';
import { MESSAGE_LANGUAGES } from './templates/wording';

const HOSPITAL = {
	sender: 'Saltmarsh General',
	phone: '+353 1 555 0100',
	emergency: '112',
	zone: 'Europe/Dublin',
	address: 'https://ropewalk.saltmarsh.example'
};
const at = Date.parse('2025-03-28T10:00:00Z');
const previews = previewsOf(HOSPITAL, at);
const languages = MESSAGE_LANGUAGES.length;
const sum = (sizes: number[]) => sizes.reduce((all, size) => all + size, 0);
const sizeOf = (wordings: object) => Object.keys(wordings).length;

describe('the previews', () => {
	it('are of every template, in every language that it has, once', () => {
		const toPatients = sizeOf(PATIENT_SMS) + sizeOf(PATIENT_MAILS);
		const toStaff = [STAFF_SMS, STAFF_MAILS, STAFF_CALLS, STAFF_NOTICES].map(sizeOf);
		expect(previews).toHaveLength(toPatients * languages + sum(toStaff));
		const names = previews.map(({ name, channel, to, language }) => [name, channel, to, language].join());
		expect(new Set(names).size).toBe(names.length);
	});

	it.each(previews.map((preview) => [preview.channel, preview.name, preview.language, preview] as const))(
		'%s %s in %s is filled in, and fits',
		(_channel, _name, _language, { text, subject, length, channel, denied, tells }) => {
			expect(`${subject} ${text}`).not.toMatch(/undefined|NaN|\[object/);
			expect(subject !== null).toBe(channel === 'mail' || channel === 'push');
			expect(tells !== null && tells !== undefined).toBe(channel === 'mail');
			expect(length?.segments ?? null).toBe(channel === 'sms' ? 1 : null);
			expect(denied).toEqual([]);
		}
	);

	it('show what becomes of a name that would tell a disease', () => {
		const [first] = previewsOf({ ...HOSPITAL, sender: 'The Heart Centre' }, at);
		expect(first?.text.startsWith('Your hospital: ')).toBe(true);
	});
});
