import { existsSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { admit, signInAs } from '../support/api';
import { itemsOf, type Phone } from '../support/fakes';
import { startProduct, type Product } from '../support/server';

/** Killed after the gateway has a message and before that is on record: fault F2. */

let product: Product;

beforeAll(async () => {
	product = await startProduct({ env: { TEST_CRASH: '1' } });
});
afterAll(() => product?.stop());

/** Texts about that call, by telephone. */
async function textsOf(code: RegExp): Promise<string[]> {
	const phones = await itemsOf<Phone>(`${product.smsUrl}/phones`);
	return phones.flatMap(({ number, messages }) =>
		messages.filter(({ body }) => code.test(body)).map(() => number)
	);
}

it('everybody who is told gets one text, also who got it in that moment', async () => {
	const coordinator = await signInAs(product.url, 'coordinator');
	const therapist = await signInAs(product.url, 'therapist');
	const episodeId = await admit(coordinator, { bed: 'F2' });
	const { body } = await therapist.post(`/api/episodes/${episodeId}/escalations`, {
		grade: 'medium',
		situation: 'Systolic pressure fell from 128 to 108.',
		background: 'Bypass.',
		assessment: 'Too much.',
		request: 'Please come.'
	});
	const died = () => existsSync(path.join(product.dataDir, 'crashed'));
	await expect.poll(died, { timeout: 20_000 }).toBe(true);
	const out = await textsOf(/bed F2\b/);
	expect(out.length).toBeGreaterThan(0);
	await product.restart();
	const steps = async () => {
		const { body: call } = await (
			await signInAs(product.url, 'therapist')
		).get(`/api/escalations/${body.id}`);
		return (call as unknown as { steps: { message: string | null }[] }).steps.map(({ message }) => message);
	};
	const settled = /^(accepted|delivered)$/;
	await expect
		.poll(async () => (await steps()).every((state) => settled.test(state ?? '')), { timeout: 20_000 })
		.toBe(true);
	const numbers = await textsOf(/bed F2\b/);
	expect(new Set(numbers).size).toBe(numbers.length);
	expect(numbers).toEqual(expect.arrayContaining(out));
	expect(numbers).toHaveLength((await steps()).length);
});
