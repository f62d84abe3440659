import { describe, expect, it } from 'vitest';
import { ROLES } from '../core/codes';
import { deniedWords } from './deny-list';
import { measureSms } from './sms-length';
import { PATIENT_SMS, SMS, smsText } from './templates';
import type { SmsTemplate } from './templates';
import { VISIT } from './testing/visit';

const LINK = 'http://127.0.0.1:3000/t/q7Zr2LxV0aYd8KcM3nTfPw';
const BEDSIDE = { unit: 'Heron Unit', bed: '4', grade: 'high', link: LINK } as const;
const PAGE = 'http://127.0.0.1:3000/p/q7Zr2LxV0aYd8KcM3nTfPw';
/** In Dublin 14:05, because summer time has begun. */
const SINCE = { since: Date.parse('2025-03-31T13:05:00Z'), zone: 'Europe/Dublin' };

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
		'visits-cancelled',
		smsText('visits-cancelled', VISIT),
		'Saltmarsh General: all your visits from Fri 28 Mar 10:00 on are cancelled. Please do not come. Questions: +353 1 555 0100.'
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
		'visits-cancelled',
		'Saltmarsh General: todas sus citas desde el vie 28 mar 10:00 se han anulado. No venga, por favor. Preguntas: +353 1 555 0100.'
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
