import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startProduct, type Product } from '../support/server';

let product: Product;
beforeAll(async () => {
	product = await startProduct({ env: { ADDRESS_HEADER: 'x-real-ip' } });
});
afterAll(() => product?.stop());

/** The product's own limit: requests of one address, person or link in ten seconds. */
const LIMIT = 100;
const HOSPITAL = '192.0.2.7';
const link = (letter: string) => `/t/${letter.repeat(22)}`;

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
		expect(await statuses(LIMIT + 1, link('a'), from(HOSPITAL))).toContain(429);
		expect(await statuses(LIMIT, link('b'), from(HOSPITAL))).not.toContain(429);
		expect(await statuses(1, link('c'), from(HOSPITAL))).not.toContain(429);
	});

	it('never answers the taking of a call with 429', async () => {
		const form = from(HOSPITAL, {
			origin: product.url,
			'content-type': 'application/x-www-form-urlencoded'
		});
		const post = { ...form, method: 'POST', body: '' };
		const seen = await statuses(3 * LIMIT, link('a'), post);
		expect(seen).not.toContain(429);
		expect([...seen].every((status) => status < 500)).toBe(true);
	});
});
