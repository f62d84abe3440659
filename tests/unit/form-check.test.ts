import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { describe, expect, it } from 'vitest';
import type { ZodObject } from 'zod';
import { giveForm } from '$lib/components/clearances/decision-forms';
import { changePasswordForm, createTokenBody, PASSWORD_MIN } from '$lib/domain/accounts/forms';
import { activityByCode } from '$lib/domain/bedside/activities/activities';
import { LIMIT_KEYS } from '$lib/domain/bedside/codes';
import { admitForm } from '$lib/domain/episodes/admit-form';
import { raiseForm } from '$lib/domain/escalations/forms';
import { decideLevelForm, refuseSignOffForm } from '$lib/domain/levels/forms';
import {
	changeUnitLimitForm,
	prescribeRangeForm,
	setPatientLimitForm,
	wordActivityForm
} from '$lib/domain/limits/page-forms';
import { fieldsOfLines } from '$lib/domain/limits/wording';
import { referForm } from '$lib/domain/referrals/forms';
import { issuesOf } from '$lib/components/form/check';

const said = async (...form: Parameters<typeof issuesOf>) =>
	(await issuesOf(...form)).map(({ path, message }) => `${path.join('.')}: ${message}`);

describe('what is said in the browser before a form is sent', () => {
	const asks = { service: 'physiotherapy', priority: 'soon' };

	it.each([
		['', ['question: What you ask is empty.']],
		['   ', ['question: What you ask is empty.']],
		['?', []],
		['?'.repeat(4000), []],
		['?'.repeat(4001), ['question: What you ask has 4001 characters, and the limit is 4000.']]
	])('a question', async (question, expected) => {
		expect(await said({ ...asks, question }, referForm)).toEqual(expected);
	});

	it('an optional field left empty is none', async () => {
		const empty = { limit: '90', maxMinutes: '', other: '', reviewOn: '', note: '', seen: '' };
		expect(await said(empty, giveForm)).toEqual([]);
		expect(await said({ ...empty, other: 'x'.repeat(201) }, giveForm)).toEqual([
			'other: Another limit has 201 characters, and the limit is 200.'
		]);
	});

	it('a call says every part that is missing, and a day that is none', async () => {
		const call = { situation: '', background: '.', assessment: '.', request: '.', grade: 'low' };
		expect(await said(call, raiseForm)).toEqual(['situation: The situation is empty.']);
		const form = { name: 'Ada', mrn: '1', birthDate: '31 2 1958', sex: 'female', unit: 'tern' };
		expect(await said(form, admitForm)).toEqual([
			'birthDate: Birth date: “31 2 1958” is no day; write one that exists, such as 14 12 2026.'
		]);
	});

	it('the forms of accounts, levels and limits say what is missing, too long or no number', async () => {
		expect(await said({ current: '', next: 'short' }, changePasswordForm)).toEqual([
			'current: The current password is empty.',
			`next: The password has at least ${PASSWORD_MIN} characters.`
		]);
		expect(await said({ to: '', reason: '' }, decideLevelForm)).toEqual([
			'to: Level: choose one from 1 to 6.'
		]);
		expect(await said({ to: '7', reason: '' }, decideLevelForm)).toEqual([
			'to: Level: choose one from 1 to 6.'
		]);
		expect(await said({ to: '6', reason: 'x'.repeat(1000) }, decideLevelForm)).toEqual([]);
		expect(await said({ name: 'x'.repeat(61) }, createTokenBody)).toHaveLength(1);
		const limit = { set: 'strict', key: LIMIT_KEYS[0], agreedBy: 'A. Lead', agreedOn: '3 12 2026' };
		expect(await said({ ...limit, value: '120', agreedOn: '31 2 2026' }, changeUnitLimitForm)).toEqual([
			'agreedOn: Agreed on: “31 2 2026” is no day; write one that exists, such as 14 12 2026.'
		]);
		expect(await said({ reason: '', id: 'any' }, refuseSignOffForm)).toEqual(['reason: Reason is empty.']);
	});
});

describe('a number that is typed into a form', () => {
	const agreed = { agreedBy: 'A. Lead', agreedOn: '3 12 2026' };
	const limit = { set: 'strict', key: LIMIT_KEYS[0], ...agreed };
	const patient = { key: LIMIT_KEYS[0], reason: 'Asked for.', untilOn: '3 12 2026' };
	const range = { hrMin: '', hrMax: '120', rpeMin: '', rpeMax: '', method: 'other', note: '' };
	const activity = {
		code: 'hall-walk',
		...fieldsOfLines(activityByCode('hall-walk')),
		minutesTo: '20',
		...agreed
	};
	const give = { limit: '90', other: '', reviewOn: '', note: '', seen: '' };
	/** Each number of each form, and whether it may be left empty. */
	const NUMBERS = [
		['New value', 'value', limit, changeUnitLimitForm, true],
		['New value', 'value', patient, setPatientLimitForm, false],
		['Pulse from', 'hrMin', range, prescribeRangeForm, true],
		['Pulse to', 'hrMax', { ...range, rpeMax: '13' }, prescribeRangeForm, true],
		['Exertion from', 'rpeMin', range, prescribeRangeForm, true],
		['Exertion to', 'rpeMax', range, prescribeRangeForm, true],
		['Minutes, from', 'minutesFrom', activity, wordActivityForm, true],
		['Times a day, to', 'timesADayTo', activity, wordActivityForm, true],
		['At most, minutes', 'maxMinutes', give, giveForm, true]
	] as const;

	/** What 12.5 is too little for. */
	const BOUNDED: Record<string, string[]> = {
		hrMin: ['hrMin: Pulse from: 12.5 cannot be taken; write a number from 20 to 250 beats/min.'],
		hrMax: ['hrMax: Pulse to: 12.5 cannot be taken; write a number from 20 to 250 beats/min.']
	};

	it.each(NUMBERS)(
		'%s (%s) is an error where it is none, and never empty',
		async (label, name, form, schema) => {
			expect(await said({ ...form, [name]: '1e' }, schema)).toEqual([
				expect.stringMatching(`^${name}: ${label}: “1e” is no number; write `)
			]);
			const { data } = schema.safeParse({ ...form, [name]: '1e' });
			expect(data).toBeUndefined();
		}
	);

	it.each(NUMBERS)('%s (%s) may have a comma, unless it is whole', async (label, name, form, schema) => {
		const wrong = await said({ ...form, [name]: '12,5' }, schema);
		expect(wrong).toEqual(
			name === 'maxMinutes'
				? [`${name}: ${label}: 12.5 cannot be taken; write a whole number from 1 to 240.`]
				: (BOUNDED[name] ?? [])
		);
	});

	it.each(NUMBERS)(
		'%s (%s) left empty is none, or asked for',
		async (label, name, form, schema, mayBeEmpty) => {
			expect(await said({ ...form, [name]: '' }, schema)).toEqual(
				mayBeEmpty ? [] : [`${name}: ${label} is empty: write one such as 12 or 12.5.`]
			);
		}
	);

	it.each(NUMBERS)(
		'%s (%s) is judged the same when it is posted, and sent back as it was typed',
		async (label, name, form, schema) => {
			const posted = new FormData();
			for (const [field, typed] of Object.entries({ ...form, [name]: '1e' })) {
				posted.set(field, typed);
			}
			const { valid, data, errors } = await superValidate(posted, zod4(schema as ZodObject));
			expect([valid, data[name]]).toEqual([false, '1e']);
			expect(errors).toEqual({ [name]: [expect.stringContaining(`${label}: “1e” is no number`)] });
		}
	);

	it('says what is wrong between the ends of a range by their labels', async () => {
		expect(await said({ ...range, hrMin: '150' }, prescribeRangeForm)).toEqual([
			'hrMin: Pulse from is 150 and Pulse to is 120: the range must not end below its start.'
		]);
		expect(await said({ ...range, hrMax: '' }, prescribeRangeForm)).toEqual([
			'hrMax: Pulse to and Exertion to are missing: a range has at least one upper end.'
		]);
	});
});
