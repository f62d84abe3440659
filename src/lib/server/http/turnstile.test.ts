import { setImmediate as turn } from 'node:timers/promises';
import { describe, expect, it } from 'vitest';
import { Turnstile } from './turnstile';

/** Send many through at once, and count how many went in each turn of the event loop. */
async function wentInEachTurn(count: number): Promise<number[]> {
	const turns: number[] = [];
	let went = 0;
	const mark = () => {
		turns.push(went);
		went = 0;
		marker = setImmediate(mark);
	};
	// Asked for before the turnstile asks, so that it runs first in each turn.
	let marker = setImmediate(mark);
	const turnstile = new Turnstile();
	await Promise.all(Array.from({ length: count }, () => turnstile.pass().then(() => (went += 1))));
	clearImmediate(marker);
	return [...turns, went];
}

describe('a turnstile', () => {
	it.each([1, 2, 60])('lets %d through one in each turn', async (count) => {
		expect(await wentInEachTurn(count)).toEqual(Array.from({ length: count }, () => 1));
	});

	it('keeps the order in which they came', async () => {
		const turnstile = new Turnstile();
		const order: number[] = [];
		await Promise.all([1, 2, 3].map((n) => turnstile.pass().then(() => order.push(n))));
		expect(order).toEqual([1, 2, 3]);
	});

	it('lets who comes alone through without a turn, again and again', async () => {
		const turnstile = new Turnstile();
		for (let n = 0; n < 3; n += 1) {
			let turned = false;
			setImmediate(() => (turned = true));
			await turnstile.pass();
			expect(turned).toBe(false);
			await turn();
			await turn();
		}
	});
});
