import { describe, expect, it } from 'vitest';
import { MAIL_FACTS, MAIL_TELLS, type MailFact } from './mail-contents';
import { MAILS, mailText, type MailTemplate } from './templates';
import { MESSAGE_LANGUAGES } from './templates/wording';

/** Everything that a careless caller could pass, one value of each. */
const RECORD = {
	...{ sender: 'Saltmarsh General', phone: '+353 1 555 0100', zone: 'Europe/Dublin', place: 'East Gym' },
	...{ startsAt: Date.parse('2025-03-28T10:00:00Z'), minutes: 45, count: 12, link: 'https://a.example/p/1' },
	...{ name: 'Ide Quillfeather', birthDate: '1958-09-05', mrn: 'SG482911', procedure: 'Bypass', bed: '4' },
	...{
		unit: 'Tern Ward',
		role: 'surgeon',
		grade: 'high',
		email: 'a@b.example',
		body: 'She slept well.',
		reason: 'Shut.'
	}
};
type Field = keyof typeof RECORD;

/** Another value for each. */
const OTHER: Record<Field, string | number> = {
	...{ sender: 'Old Harbour', phone: '+353 1 555 0199', zone: 'America/New_York', place: 'West Gym' },
	...{ startsAt: Date.parse('2025-04-29T11:30:00Z'), minutes: 60, count: 13, link: 'https://a.example/p/2' },
	...{ name: 'Cathal Okonkwo', birthDate: '1961-01-02', mrn: 'SG111111', procedure: 'Valve', bed: '5' },
	...{
		unit: 'Heron Unit',
		role: 'nurse',
		grade: 'low',
		email: 'c@d.example',
		body: 'He did not.',
		reason: 'Ill.'
	}
};

const FIELDS_OF: Record<MailFact, readonly Field[]> = {
	...{ sender: ['sender'], phone: ['phone'], time: ['startsAt', 'zone'], place: ['place'] },
	...{ minutes: ['minutes'], count: ['count'], link: ['link'] },
	...{ unit: ['unit'], bed: ['bed'], grade: ['grade'] }
};

function written(template: MailTemplate, record: object, language: string): string {
	const { startsAt, zone, place } = record as typeof RECORD;
	const { subject, text } = mailText(
		template,
		{ ...record, visits: [{ startsAt, zone, place }] } as never,
		language
	);
	return `${subject}\n${text}`;
}

describe.each(Object.keys(MAILS) as MailTemplate[])('the mail %s', (template) => {
	it.each(MESSAGE_LANGUAGES)('tells what its list says and nothing else, in %s', (language) => {
		const before = written(template, RECORD, language);
		const fields = Object.keys(RECORD) as Field[];
		const told = fields.filter((field) => {
			return written(template, { ...RECORD, [field]: OTHER[field] }, language) !== before;
		});
		expect(told.toSorted()).toEqual(MAIL_TELLS[template].flatMap((fact) => FIELDS_OF[fact]).toSorted());
	});
});

it('every fact is told by some mail', () => {
	expect(new Set(Object.values(MAIL_TELLS).flat())).toEqual(new Set(MAIL_FACTS));
});
