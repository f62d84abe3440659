import { superValidate } from 'sveltekit-superforms';
import { zod4 } from 'sveltekit-superforms/adapters';
import { expect, it } from 'vitest';
import { decideLevelBody, decideLevelForm } from './forms';

it.each([
	[1, true],
	[6, true],
	[0, false],
	[7, false],
	[2.5, false],
	['3', false]
])('a decision for level %j is accepted: %s', (to, accepted) => {
	expect(decideLevelBody.safeParse({ to }).success).toBe(accepted);
});

it('a form that was sent before a level was chosen chooses none', async () => {
	const posted = new FormData();
	posted.set('reason', 'Strong.');
	const form = await superValidate(posted, zod4(decideLevelForm));
	expect(form.valid).toBe(false);
	expect(form.errors.to).toEqual(['Level: choose one from 1 to 6.']);
});
