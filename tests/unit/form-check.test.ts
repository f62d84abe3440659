import { describe, expect, it } from 'vitest';
import { giveForm } from '$lib/components/clearances/decision-forms';
import { changePasswordForm, createTokenBody, PASSWORD_MIN } from '$lib/domain/accounts/forms';
import { LIMIT_KEYS } from '$lib/domain/bedside/codes';
import { admitForm } from '$lib/domain/episodes/admit-form';
import { raiseForm } from '$lib/domain/escalations/forms';
import { decideLevelForm, refuseSignOffForm } from '$lib/domain/levels/forms';
import { changeUnitLimitForm } from '$lib/domain/limits/forms';
import { referForm } from '$lib/domain/referrals/forms';
import { issuesOf } from '$lib/components/form/check';

const said = async (...form: Parameters<typeof issuesOf>) =>
	(await issuesOf(...form)).map(({ path, message }) => `${path.join('.')}: ${message}`);

describe('what is said in the browser before a form is sent', () => {
	const asks = { service: 'physiotherapy', priority: 'soon' };

	it.each([
		['', ['question: Question is empty.']],
		['   ', ['question: Question is empty.']],
		['?', []],
		['?'.repeat(4000), []],
		['?'.repeat(4001), ['question: Question has at most 4000 characters.']]
	])('a question', async (question, expected) => {
		expect(await said({ ...asks, question }, referForm)).toEqual(expected);
	});

	it('an optional field left empty is none', async () => {
		const empty = { limit: '90', maxMinutes: undefined, other: '', reviewOn: '', note: '', seen: '' };
		expect(await said(empty, giveForm)).toEqual([]);
		expect(await said({ ...empty, other: 'x'.repeat(201) }, giveForm)).toEqual([
			'other: Other limit has at most 200 characters.'
		]);
	});

	it('a call says every part that is missing, and a day that is none', async () => {
		const call = { situation: '', background: '.', assessment: '.', request: '.', grade: 'low' };
		expect(await said(call, raiseForm)).toEqual(['situation: The situation is empty.']);
		const form = { name: 'Ada', mrn: '1', birthDate: '31 2 1958', sex: 'female', unit: 'tern' };
		expect(await said(form, admitForm)).toEqual([
			'birthDate: Birth date: write a day that exists, such as 5 9 1958.'
		]);
	});

	it('the forms of accounts, levels and limits say what is missing, too long or no number', async () => {
		expect(await said({ current: '', next: 'short' }, changePasswordForm)).toEqual([
			'current: The current password is empty.',
			`next: The password has at least ${PASSWORD_MIN} characters.`
		]);
		expect(await said({ to: '', reason: '' }, decideLevelForm)).toEqual(['to: Choose a level from 1 to 6.']);
		expect(await said({ to: '7', reason: '' }, decideLevelForm)).toEqual(['to: Choose a level from 1 to 6.']);
		expect(await said({ to: '6', reason: 'x'.repeat(1000) }, decideLevelForm)).toEqual([]);
		expect(await said({ name: 'x'.repeat(61) }, createTokenBody)).toHaveLength(1);
		const limit = { set: 'strict', key: LIMIT_KEYS[0], agreedBy: 'A. Lead', agreedOn: '3 12 2026' };
		// A number that was taken out again is none: the limit goes back to its default.
		for (const value of [undefined, null, 120]) {
			const wrong = await said({ ...limit, value }, changeUnitLimitForm);
			expect(wrong).toEqual([]);
		}
		expect(await said({ ...limit, agreedOn: '31 2 2026' }, changeUnitLimitForm)).toEqual([
			'agreedOn: Agreed on: “31 2 2026” is no day; write one that exists, such as 14 12 2026.'
		]);
		expect(await said({ reason: '', id: 'any' }, refuseSignOffForm)).toHaveLength(1);
	});
});
