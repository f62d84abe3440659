/**
 * No template tells anything about a patient. Every template in every language is filled with everything that is
 * known about 1,000 generated people, as a careless caller would pass it, and searched for any of it.
 */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { GRADES, ROLES } from '../core/codes';
import { deniedWords } from './deny-list';
import { measureSms } from './sms-length';
import { PATIENT_MAILS, PATIENT_SMS, STAFF_CALLS, STAFF_MAILS, STAFF_NOTICES, STAFF_SMS } from './templates';
import { MESSAGE_LANGUAGES } from './templates/wording';

const pick = fc.constantFrom;
const two = (value: number) => String(value).padStart(2, '0');

const PHONES = ['+353 1 555 0100', '+35315550100'];

const people = fc.record({
	surname: pick(
		'Abernathy',
		"O'Kelleher",
		'Vasquez-Ruiz',
		'Ní Bhroin',
		'Thistlewood',
		'Okonkwo',
		'Lindqvist'
	),
	firstName: pick('Marguerite', 'Cathal', 'Ifeoma', 'Sigrún', 'Barnaby', 'Xochitl'),
	mrn: fc
		.integer({ min: 100_000, max: 999_999 })
		// One that stands in the number to call would be found in every text.
		.filter((number) => !PHONES.some((phone) => phone.includes(String(number))))
		.map((number) => `SG${number}`),
	born: fc.record({
		year: fc.integer({ min: 1925, max: 2006 }),
		month: fc.integer({ min: 1, max: 12 }),
		day: fc.integer({ min: 1, max: 28 })
	}),
	diagnosis: pick('three-vessel coronary disease', 'severe aortic stenosis', 'mitral regurgitation'),
	procedure: pick('CABG x3', 'aortic valve replacement', 'closure of an atrial defect'),
	drug: pick('bisoprolol 2.5 mg', 'warfarin', 'amiodarone'),
	result: pick('blood pressure 88/50', 'saturation 86 %', 'INR 3.9'),
	specialty: pick('cardiac surgery', 'cardiology', 'speech therapy'),
	// A hospital may have named its places after what is done there.
	place: pick('East Gym', 'West Gym, door 3', 'Cardiac Rehab Gym', 'Heart Failure Clinic', 'Dún Áras', 'Зал'),
	sender: pick('Saltmarsh General', 'The Heart Centre', 'Institute of Thoracic Surgery', 'Old Harbour'),
	unit: pick('Heron Unit', 'Tern Ward', 'Plover House'),
	bed: fc.option(pick('4', '12B', 'Window')),
	grade: pick(...GRADES),
	code: fc.option(pick('4829', '222333')),
	holder: pick(...ROLES),
	since: fc.integer({ min: Date.parse('2025-01-01'), max: Date.parse('2027-01-01') }),
	startsAt: fc.integer({ min: Date.parse('2025-01-01'), max: Date.parse('2027-01-01') }),
	zone: pick('Europe/Dublin', 'America/New_York', 'Australia/Lord_Howe'),
	confirmed: fc.boolean(),
	count: fc.integer({ min: 1, max: 60 }),
	phone: pick(...PHONES),
	emergency: fc.constant('112'),
	link: fc.constant('http://127.0.0.1:3000/t/q7Zr2LxV0aYd8KcM3nTfPw')
});
type Person = typeof people extends fc.Arbitrary<infer T> ? T : never;

/** What must not be found, in every spelling in which it would be recognised. */
function secretsOf(person: Person): string[] {
	const { year, month, day } = person.born;
	const dates = [
		`${year}-${two(month)}-${two(day)}`,
		`${two(day)}/${two(month)}/${year}`,
		`${two(day)}.${two(month)}.${year}`,
		`${day}/${month}/${year}`,
		`${two(month)}/${two(day)}/${year}`
	];
	const { surname, firstName, mrn, diagnosis, procedure, drug, result, specialty } = person;
	return [
		surname,
		firstName,
		mrn,
		mrn.slice(2),
		String(year),
		diagnosis,
		procedure,
		drug,
		result,
		specialty,
		...dates
	];
}

const bare = (text: string) => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();

/** Everything in a text that should not be there. */
function leaks(text: string, person: Person): string[] {
	return [...secretsOf(person).filter((secret) => bare(text).includes(bare(secret))), ...deniedWords(text)];
}

/** All fields of all templates and all of the record, under the names a caller would use. */
function everything(person: Person) {
	const { startsAt, zone, place } = person;
	const visits = [{ startsAt, zone, place }];
	return {
		...person,
		visits,
		minutes: 45,
		name: `${person.firstName} ${person.surname}`,
		birthDate: secretsOf(person).at(-1)
	};
}

const RUNS = { numRuns: 1000 };

type Write<T> = (fields: ReturnType<typeof everything>) => T;

describe.each(MESSAGE_LANGUAGES)('property: nothing leaks to patients in %s', (language) => {
	it.each(Object.keys(PATIENT_SMS) as (keyof typeof PATIENT_SMS)[])(
		'text %s: one part, no bed',
		(template) => {
			const write = PATIENT_SMS[template][language] as Write<string>;
			fc.assert(
				fc.property(people, (person) => {
					const text = write(everything(person));
					expect(leaks(text, person)).toEqual([]);
					expect(measureSms(text)).toMatchObject({ encoding: 'gsm7', segments: 1 });
					expect(text).not.toContain(person.unit);
					expect(text).not.toContain('bed');
				}),
				RUNS
			);
		}
	);

	it.each(Object.keys(PATIENT_MAILS) as (keyof typeof PATIENT_MAILS)[])('mail %s', (template) => {
		const write = PATIENT_MAILS[template][language] as Write<{ subject: string; text: string }>;
		fc.assert(
			fc.property(people, (person) => {
				expect(mailLeaks(write(everything(person)), person)).toEqual([]);
			}),
			RUNS
		);
	});
});

describe('property: nothing leaks to staff', () => {
	it.each(Object.keys(STAFF_SMS) as (keyof typeof STAFF_SMS)[])('text %s', (template) => {
		const write = STAFF_SMS[template].en as Write<string>;
		fc.assert(
			fc.property(people, (person) => {
				expect(leaks(write(everything(person)), person)).toEqual([]);
			}),
			RUNS
		);
	});

	it.each(Object.keys(STAFF_CALLS) as (keyof typeof STAFF_CALLS)[])('call %s', (template) => {
		const write = STAFF_CALLS[template].en as Write<string>;
		fc.assert(
			fc.property(people, (person) => {
				expect(leaks(write(everything(person)), person)).toEqual([]);
			}),
			RUNS
		);
	});

	it.each(Object.keys(STAFF_NOTICES) as (keyof typeof STAFF_NOTICES)[])('notice %s', (template) => {
		const write = STAFF_NOTICES[template].en as Write<{ subject: string; text: string }>;
		fc.assert(
			fc.property(people, (person) => {
				expect(mailLeaks(write(everything(person)), person)).toEqual([]);
			}),
			RUNS
		);
	});

	it.each(Object.keys(STAFF_MAILS) as (keyof typeof STAFF_MAILS)[])('mail %s', (template) => {
		const write = STAFF_MAILS[template].en as Write<{ subject: string; text: string }>;
		fc.assert(
			fc.property(people, (person) => {
				expect(mailLeaks(write(everything(person)), person)).toEqual([]);
			}),
			RUNS
		);
	});
});

/** A subject shows on locked screens: it names no unit either. */
function mailLeaks({ subject, text }: { subject: string; text: string }, person: Person): string[] {
	const unit = subject.includes(person.unit) ? [person.unit] : [];
	return [...leaks(subject, person), ...leaks(text, person), ...unit];
}

describe('the search itself', () => {
	it('finds each kind of secret', () => {
		fc.assert(
			fc.property(people, (person) => {
				for (const secret of secretsOf(person)) {
					expect(leaks(`Ropewalk: ${secret.toUpperCase()}.`, person)).not.toEqual([]);
				}
			})
		);
	});
});
