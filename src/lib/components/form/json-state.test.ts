import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { JsonState, type Refusal } from './json-state.svelte';

const schema = z.strictObject({
	reason: z.string().trim().min(1, 'The reason is empty.').max(5, 'The reason has at most 5 characters.'),
	to: z.string('To whom is open.').min(1, 'To whom is open.').optional()
});
const refusal = (fields: Record<string, string>): Refusal => ({
	title: 'Not done',
	text: 'Why.',
	signIn: false,
	fields
});

/** Press once with this reason, and say whether it went out. */
async function pressed(state: JsonState, reason: string): Promise<boolean> {
	let sent = false;
	await state.press({ reason, to: undefined }, () => (sent = true));
	return sent;
}

describe('a form that is sent as JSON', () => {
	it.each([
		['', false, { reason: ['The reason is empty.'] }],
		['  ', false, { reason: ['The reason is empty.'] }],
		['x', true, {}],
		['12345', true, {}],
		['123456', false, { reason: ['The reason has at most 5 characters.'] }]
	])('%j: goes out %j', async (reason, goes, errors) => {
		const state = new JsonState(() => Promise.resolve(schema));
		expect(await pressed(state, reason)).toBe(goes);
		expect(state.errors(null)).toEqual(errors);
	});

	it('leaves what it cannot check to the server', async () => {
		const state = new JsonState(() => Promise.reject(new Error('no network')));
		expect(await pressed(state, '')).toBe(true);
	});

	it('says the word of the server beside its field, and of the whole only what stands beside none', async () => {
		const state = new JsonState(() => Promise.resolve(schema));
		await pressed(state, 'x');
		const beside = refusal({ 'reason/0': 'The reason is known.' });
		expect(state.errors(beside)).toEqual({ reason: ['The reason is known.'] });
		expect(state.whole(beside, ['reason'])).toBeNull();
		for (const other of [refusal({}), refusal({ reason: 'x', unit: 'The unit is gone.' })]) {
			expect(state.whole(other, ['reason'])).toBe(other);
		}
	});

	it('says nothing of a refusal that came before the last press', async () => {
		const state = new JsonState(() => Promise.resolve(schema));
		const old = refusal({ reason: 'The reason is known.' });
		expect([state.errors(old), state.whole(refusal({}), ['reason'])]).toEqual([{}, null]);
		await pressed(state, 'x');
		await pressed(state, '');
		expect(state.errors(old)).toEqual({ reason: ['The reason is empty.'] });
		expect(state.whole(refusal({}), ['reason'])).toBeNull();
	});

	it('goes out once while the first press is on its way', async () => {
		const state = new JsonState(() => Promise.resolve(schema));
		let answer = (): void => {};
		const answered = new Promise<void>((resolve) => (answer = resolve));
		let times = 0;
		const send = () => {
			times += 1;
			return answered;
		};
		const first = state.press({ reason: 'x' }, send);
		await state.press({ reason: 'x' }, send);
		answer();
		await first;
		expect(times).toBe(1);
	});
});
