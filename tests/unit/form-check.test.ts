import { describe, expect, it } from 'vitest';
import { giveForm } from '$lib/components/clearances/decision-forms';
import { admitForm } from '$lib/domain/episodes/admit-form';
import { raiseForm } from '$lib/domain/escalations/forms';
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
});
