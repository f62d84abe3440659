import { describe, expect, it } from 'vitest';
import { ROLES } from '../core/codes';
import { deniedWords } from './deny-list';
import { isGsm7 } from './gsm7';
import { measureSms } from './sms-length';
import { PATIENT_SMS, SMS, STAFF_SMS, mailText, smsText } from './templates';
import type { SmsTemplate } from './templates';
import { dayAndTime, MESSAGE_LANGUAGES, messageLanguage, safeName, shortened } from './templates/wording';

const LINK = 'http://127.0.0.1:3000/t/q7Zr2LxV0aYd8KcM3nTfPw';
const BEDSIDE = { unit: 'Heron Unit', bed: '4', grade: 'high', link: LINK } as const;
const PAGE = 'http://127.0.0.1:3000/p/q7Zr2LxV0aYd8KcM3nTfPw';
/** In Dublin 14:05, because summer time has begun. */
const SINCE = { since: Date.parse('2025-03-31T13:05:00Z'), zone: 'Europe/Dublin' };
const VISIT = {
	sender: 'Saltmarsh General',
	phone: '+353 1 555 0100',
	startsAt: Date.parse('2025-03-28T10:00:00Z'),
	zone: 'Europe/Dublin',
	place: 'East Gym',
	emergency: '112'
};

/** Each template word for word: a change of wording is a decision, and shows here. */
const TEXTS: [SmsTemplate, string, string][] = [
	[
		'escalation',
		smsText('escalation', { ...BEDSIDE, code: '4821' }),
		`Ropewalk HIGH: Heron Unit, bed 4. To take it open ${LINK} or reply TAKE 4821`
	],
	[
		'escalation-taken',
		smsText('escalation-taken', { ...BEDSIDE, holder: 'nurse' }),
		'Ropewalk HIGH: Heron Unit, bed 4: a nurse has it. You need do nothing.'
	],
	[
		'holder-asked',
		smsText('holder-asked', BEDSIDE),
		`Ropewalk HIGH: Heron Unit, bed 4: are you there? Else others are told. ${LINK}`
	],
	['took-it', smsText('took-it', BEDSIDE), `Ropewalk HIGH: Heron Unit, bed 4: it is yours. ${LINK}`],
	[
		'taken-before',
		smsText('taken-before', { ...BEDSIDE, ...SINCE, holder: 'nurse' }),
		'Ropewalk HIGH: Heron Unit, bed 4: NOT yours. A nurse has it since 14:05. Nothing is asked of you now.'
	],
	[
		'over-before',
		smsText('over-before', { ...BEDSIDE, ...SINCE }),
		'Ropewalk HIGH: Heron Unit, bed 4: NOT taken, it is over since 14:05. Nothing is asked of you now.'
	],
	[
		'may-not-take',
		smsText('may-not-take', {}),
		'Ropewalk: NOT taken. Your account may not take calls. The call goes on to others.'
	],
	[
		'unknown-code',
		smsText('unknown-code', { code: '4829' }),
		'Ropewalk: NOT taken. No call that you may take has the code 4829. Look at the code again, or open the link of the call.'
	],
	[
		'which-one',
		smsText('which-one', {}),
		'Ropewalk: NOT taken. Several calls were sent to you. Reply TAKE and the code of one, or open its link.'
	],
	[
		'none-open',
		smsText('none-open', {}),
		'Ropewalk: NOT taken. No call that was sent to you is waiting. Sign in to see all of them.'
	],
	[
		'staff-unclear',
		smsText('staff-unclear', { code: '4829' }),
		'Ropewalk: NOT taken, and nobody reads this. To take a call reply TAKE 4829, or open its link.'
	],
	[
		'shared-number',
		smsText('shared-number', {}),
		'Ropewalk: NOT taken. This number is on record for several people. Open the link of the call, or sign in.'
	],
	[
		'unknown-number',
		smsText('unknown-number', {}),
		'Ropewalk: NOT taken. This number is on record for nobody who takes calls. Sign in to take it.'
	],
	[
		'visit-reminder',
		smsText('visit-reminder', { ...VISIT, confirmed: false }),
		'Saltmarsh General: your visit is Fri 28 Mar 10:00, East Gym. Reply YES or NO. Questions: +353 1 555 0100. STOP ends texts.'
	],
	[
		'visit-moved',
		smsText('visit-moved', VISIT),
		'Saltmarsh General: your visit is MOVED to Fri 28 Mar 10:00, East Gym. Reply YES or NO. Questions: +353 1 555 0100. STOP ends texts.'
	],
	[
		'visit-cancelled',
		smsText('visit-cancelled', VISIT),
		'Saltmarsh General: your visit Fri 28 Mar 10:00 is cancelled. Please do not come. Questions: +353 1 555 0100.'
	],
	[
		'visit-confirmed',
		smsText('visit-confirmed', VISIT),
		'Saltmarsh General: thank you, see you Fri 28 Mar 10:00, East Gym. To change it call +353 1 555 0100.'
	],
	[
		'visit-declined',
		smsText('visit-declined', VISIT),
		'Saltmarsh General: thank you, Fri 28 Mar 10:00 is cancelled. We will call about another time, or call +353 1 555 0100.'
	],
	[
		'no-visit-open',
		smsText('no-visit-open', VISIT),
		'Saltmarsh General: no visit is waiting for your answer. Questions: +353 1 555 0100.'
	],
	[
		'person-reads',
		smsText('person-reads', VISIT),
		'Saltmarsh General: thank you. A person will read it, but not at once. Sooner: +353 1 555 0100. In an emergency call 112.'
	],
	[
		'texts-stopped',
		smsText('texts-stopped', VISIT),
		'Saltmarsh General: no more texts will come. START brings them back. Questions: +353 1 555 0100.'
	],
	[
		'texts-started',
		smsText('texts-started', VISIT),
		'Saltmarsh General: texts about your visits will come again. STOP ends them. Questions: +353 1 555 0100.'
	],
	[
		'texts-help',
		smsText('texts-help', VISIT),
		'Saltmarsh General: Reply YES, NO, or STOP to end texts. Questions: +353 1 555 0100. In an emergency call 112.'
	],
	[
		'page-link',
		smsText('page-link', { ...VISIT, link: PAGE }),
		`Saltmarsh General: your visits: ${PAGE} For you alone. Help: +353 1 555 0100. STOP ends texts.`
	]
];

/** The texts to patients in Spanish; accents that the alphabet of texts lacks are left out. */
const SPANISH: [keyof typeof PATIENT_SMS, string][] = [
	[
		'visit-reminder',
		'Saltmarsh General: su cita es vie 28 mar 10:00, East Gym. Responda SI o NO. Preguntas: +353 1 555 0100. STOP: no mas textos.'
	],
	[
		'visit-moved',
		'Saltmarsh General: su cita CAMBIA a vie 28 mar 10:00, East Gym. Responda SI o NO. Preguntas: +353 1 555 0100. STOP: no mas textos.'
	],
	[
		'visit-cancelled',
		'Saltmarsh General: su cita vie 28 mar 10:00 se ha anulado. No venga, por favor. Preguntas: +353 1 555 0100.'
	],
	[
		'visit-confirmed',
		'Saltmarsh General: gracias, le esperamos vie 28 mar 10:00, East Gym. Para cambiarla llame al +353 1 555 0100.'
	],
	[
		'visit-declined',
		'Saltmarsh General: gracias, vie 28 mar 10:00 queda anulada. Le llamaremos para otra hora, o llame al +353 1 555 0100.'
	],
	['no-visit-open', 'Saltmarsh General: ninguna cita espera su respuesta. Preguntas: +353 1 555 0100.'],
	[
		'person-reads',
		'Saltmarsh General: gracias. Una persona lo leera, pero no enseguida. Antes: +353 1 555 0100. Si es una emergencia llame al 112.'
	],
	[
		'texts-stopped',
		'Saltmarsh General: no recibira mas textos. Con START vuelven. Preguntas: +353 1 555 0100.'
	],
	[
		'texts-started',
		'Saltmarsh General: los textos sobre sus citas vuelven a llegar. STOP los para. Preguntas: +353 1 555 0100.'
	],
	[
		'texts-help',
		'Saltmarsh General: Responda SI, NO o STOP. Preguntas: +353 1 555 0100. Si es una emergencia llame al 112.'
	],
	[
		'page-link',
		`Saltmarsh General: sus citas http://127.0.0.1:3000/p/q7Zr2LxV0aYd8KcM3nTfPw Solo para usted. Tel. +353 1 555 0100. STOP: no mas.`
	]
];

describe('texts', () => {
	it.each(TEXTS)('%s', (_, text, expected) => {
		expect(text).toBe(expected);
		expect(measureSms(text)).toMatchObject({ encoding: 'gsm7', segments: 1 });
	});

	it('the table has every template', () => {
		expect(TEXTS.map(([template]) => template)).toEqual(Object.keys(SMS));
		expect(SPANISH.map(([template]) => template)).toEqual(Object.keys(PATIENT_SMS));
	});

	it.each(SPANISH)('%s in Spanish', (template, expected) => {
		const text = smsText(template, { ...VISIT, confirmed: false, link: PAGE }, 'es');
		expect(text).toBe(expected);
		expect(measureSms(text)).toMatchObject({ encoding: 'gsm7', segments: 1 });
	});

	it('staff are written to in the language of the hospital, whatever theirs is', () => {
		expect(smsText('may-not-take', {}, 'es')).toBe(smsText('may-not-take', {}));
	});

	it('without bed or code', () => {
		expect(smsText('escalation', { ...BEDSIDE, bed: null, grade: 'low', code: null })).toBe(
			`Ropewalk LOW: Heron Unit. To take it open ${LINK}`
		);
	});

	it('without a code of its own the general answer asks for one', () => {
		expect(smsText('staff-unclear', { code: null })).toContain('reply TAKE and its code, or');
	});

	it.each(ROLES)('a %s who has it is not named more closely', (holder) => {
		const text = smsText('taken-before', { ...BEDSIDE, ...SINCE, holder });
		expect(text).toMatch(/NOT yours\. A (nurse|doctor|colleague) has it since/);
		expect(deniedWords(text)).toEqual([]);
	});

	it('a confirmed visit is not asked again', () => {
		expect(smsText('visit-reminder', { ...VISIT, confirmed: true })).toBe(
			'Saltmarsh General: your visit is Fri 28 Mar 10:00, East Gym. Reply NO if you cannot come. Questions: +353 1 555 0100. STOP ends texts.'
		);
	});
});

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
		...BEDSIDE,
		...SINCE,
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

describe('mails', () => {
	const link = 'https://ropewalk.saltmarsh.example/patients/1';

	it('tell nothing but where to sign in', () => {
		expect(mailText('referrer', { link })).toEqual({
			subject: 'Ropewalk: something to read',
			text: `There is news about a referral of yours. Sign in to read it:\n\n${link}\n\n-- \nRopewalk sends links only. Nobody reads answers to this address.\n`
		});
		expect(mailText('invitation', { link })).toEqual({
			subject: 'Ropewalk: your account',
			text: `Choose a password for your account here; the link works once:\n\n${link}\n\n-- \nRopewalk sends links only. Nobody reads answers to this address.\n`
		});
	});
});

describe('mails to patients', () => {
	it.each([
		['visit-booked', 'en', 'Saltmarsh General: your visit', 'Your visit is Fri 28 Mar 10:00, East Gym.'],
		['visit-booked', 'es', 'Saltmarsh General: su cita', 'Su cita es vie 28 mar 10:00, East Gym.'],
		[
			'series-booked',
			'en',
			'Saltmarsh General: your visits',
			'36 visits are booked for you. Their days and times are in the file.'
		],
		[
			'series-booked',
			'es',
			'Saltmarsh General: sus citas',
			'Tiene 36 citas. Los días y las horas están en el archivo.'
		],
		[
			'visit-moved',
			'en',
			'Saltmarsh General: your visit has moved',
			'Your visit is now Fri 28 Mar 10:00, East Gym.'
		],
		[
			'visit-moved',
			'es',
			'Saltmarsh General: su cita cambia',
			'Su cita es ahora vie 28 mar 10:00, East Gym.'
		],
		[
			'visit-cancelled',
			'en',
			'Saltmarsh General: your visit is cancelled',
			'Your visit Fri 28 Mar 10:00, East Gym is cancelled.'
		],
		[
			'visit-cancelled',
			'es',
			'Saltmarsh General: su cita se ha anulado',
			'Su cita vie 28 mar 10:00, East Gym se ha anulado.'
		]
	] as const)('%s in %s', (template, language, subject, first) => {
		const mail = mailText(template, { ...VISIT, count: 36 }, language);
		expect(mail.subject).toBe(subject);
		expect(mail.text.split('\n')[0]).toBe(first);
		expect(mail.text).toContain('+353 1 555 0100');
		expect(deniedWords(`${mail.subject} ${mail.text}`)).toEqual([]);
	});

	it('with the link of the page, which is for the patient alone', () => {
		const mail = mailText('page-link', { ...VISIT, link: PAGE });
		expect(mail.subject).toBe('Saltmarsh General: your visits');
		expect(mail.text).toContain(`\n\n${PAGE}\n\n`);
	});
});

describe('the small parts', () => {
	it.each([
		['2025-03-28T10:00:00Z', 'Europe/Dublin', 'Fri 28 Mar 10:00'],
		['2025-03-31T09:00:00Z', 'Europe/Dublin', 'Mon 31 Mar 10:00'],
		['2025-09-05T23:05:00Z', 'Europe/Dublin', 'Sat 6 Sep 00:05'],
		['2025-12-31T12:00:00Z', 'America/New_York', 'Wed 31 Dec 07:00']
	])('%s in %s is %s', (at, zone, expected) => {
		expect(dayAndTime(Date.parse(at), zone, 'en')).toBe(expected);
	});

	it.each([
		['en', 'en'],
		['en-IE', 'en'],
		['EN_gb', 'en'],
		['es-ES', 'es'],
		['pl', 'en'],
		['', 'en'],
		[null, 'en']
	])('language %j is written to in %s', (language, expected) => {
		expect(messageLanguage(language)).toBe(expected);
	});

	it.each([
		['East Gym', 8, 'East Gym'],
		['East Gym', 7, 'East G.'],
		['East Gym', 6, 'East.'],
		['[[[[', 6, '[[.'],
		['East Gym', 1, '.'],
		['', 5, '']
	])('%j in %i units is %j', (text, units, expected) => {
		expect(shortened(text, units)).toBe(expected);
		expect(measureSms(shortened(text, units)).units).toBeLessThanOrEqual(units);
	});

	it.each([
		['East Gym', 'East Gym'],
		['St Brigid’s', "St Brigid's"],
		['Valve Clinic', 'there'],
		['', 'there']
	])('name %j is sent as %j', (name, expected) => {
		expect(safeName(name, 'there')).toBe(expected);
	});
});
