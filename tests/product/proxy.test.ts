import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { admit, newKey, signInAs } from '../support/api';
import { itemsOf } from '../support/fakes';
import { startProduct, type Product } from '../support/server';

let product: Product;
/** Paths of links that were sent about two calls for help. */
let links: string[];

beforeAll(async () => {
	product = await startProduct({ env: { ADDRESS_HEADER: 'x-real-ip' } });
	const therapist = await signInAs(product.url, 'therapist');
	const surgeon = await signInAs(product.url, 'surgeon');
	for (let call = 0; call < 2; call += 1) {
		await therapist.post(`/api/episodes/${await admit(surgeon)}/escalations`, CALL, {
			'idempotency-key': newKey()
		});
	}
	await product.advance(1);
	const phones = await itemsOf<{ messages: { body: string }[] }>(`${product.smsUrl}/phones`);
	links = phones.flatMap(({ messages }) =>
		messages.flatMap(({ body }) => /\/t\/[\w-]{22}/.exec(body)?.[0] ?? [])
	);
});
afterAll(() => product?.stop());

/** The product's own limit: requests of one address, person or link in ten seconds. */
const LIMIT = 100;
const HOSPITAL = '192.0.2.7';
const CALL = { grade: 'high', situation: 's', background: 'b', assessment: 'a', request: 'r' };
const link = (index: number) => links[index] ?? 'no such link';
const madeUp = (index: number) => `/t/${String(index).padStart(22, 'x')}`;

async function statuses(times: number, path: string, init: RequestInit): Promise<Set<number>> {
	const all = await Promise.all(
		Array.from({ length: times }, async () => {
			const response = await fetch(product.url + path, { redirect: 'manual', ...init });
			await response.arrayBuffer();
			return response.status;
		})
	);
	return new Set(all);
}

const from = (address: string, more: Record<string, string> = {}) => ({
	headers: { 'x-real-ip': address, ...more }
});

describe('behind a proxy', () => {
	it.each(['/healthz', '/readyz', '/sign-in', '/'])(
		'%s is answered when it comes without the header',
		async (path) => {
			expect(await statuses(1, path, {})).toEqual(new Set([200]));
		}
	);

	it('counts for the address in the header, not for the proxy', async () => {
		expect(await statuses(LIMIT + 1, '/api/me', from('192.0.2.1'))).toEqual(new Set([401, 429]));
		expect(await statuses(1, '/api/me', from('192.0.2.2'))).toEqual(new Set([401]));
	});

	it('counts a link by itself: one that is asked for too often stops no other', async () => {
		expect(await statuses(LIMIT + 1, link(0), from(HOSPITAL))).toEqual(new Set([200, 429]));
		expect(await statuses(LIMIT, link(1), from(HOSPITAL))).toEqual(new Set([200]));
		expect(await statuses(1, `${link(2)}/state`, from(HOSPITAL))).toEqual(new Set([200]));
	});

	it('counts made-up links together, for the address that they come from', async () => {
		const guesser = from('192.0.2.66');
		const seen = await Promise.all(
			Array.from({ length: LIMIT + 1 }, (_, index) => statuses(1, madeUp(index), guesser))
		);
		expect(seen.filter((each) => each.has(404))).toHaveLength(LIMIT);
		expect(seen.filter((each) => each.has(429))).toHaveLength(1);
		expect(await statuses(1, link(2), guesser)).toEqual(new Set([200]));
		expect(await statuses(1, madeUp(0), { ...form('192.0.2.66'), method: 'POST', body: '' })).toEqual(
			new Set([429])
		);
	});

	it('never answers the taking of a call with 429', async () => {
		const seen = await statuses(3 * LIMIT, link(0), { ...form(HOSPITAL), method: 'POST', body: '' });
		expect([...seen].filter((status) => status >= 300 && status !== 303)).toEqual([]);
	});

	const form = (address: string) =>
		from(address, { origin: product.url, 'content-type': 'application/x-www-form-urlencoded' });
});
