import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';

const SPANISH = 'PARAGLIDE_LOCALE=es';
let product: Product;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
});
afterAll(() => product?.stop());

const front = async (cookie?: string) =>
	(await fetch(`${product.url}/`, { headers: cookie ? { cookie } : {} })).text();

describe('the language of a page', () => {
	it.each([
		[undefined, 'en', 'No question left hanging'],
		[SPANISH, 'es', 'Ninguna pregunta queda en el aire'],
		['PARAGLIDE_LOCALE=xx', 'en', 'No question left hanging']
	])('with the cookie %s is %s', async (cookie, lang, words) => {
		const html = await front(cookie);
		expect(html).toContain(`<html lang="${lang}">`);
		expect(html).toContain(words);
	});

	it('is each reader’s own, also when two read at once', async () => {
		const pages = await Promise.all(
			Array.from({ length: 12 }, (_, index) => front(index % 2 ? SPANISH : undefined))
		);
		expect(pages.map((html) => /<html lang="(..)"/.exec(html)?.[1])).toEqual(
			pages.map((_, index) => (index % 2 ? 'es' : 'en'))
		);
	});
});

it('what a write puts on record stays in the language of the hospital', async () => {
	const surgeon = await signInAs(product.url, 'surgeon');
	const therapist = await signInAs(product.url, 'therapist');
	const episodeId = await admit(await signInAs(product.url, 'coordinator'), {});
	const body = { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' };
	const referral = (await surgeon.post(`/api/episodes/${episodeId}/referrals`, body)).body;
	const answer = await fetch(`${product.url}/api/referrals/${referral.id}/accept`, {
		method: 'POST',
		headers: {
			cookie: `${therapist.cookie}; ${SPANISH}`,
			origin: product.url,
			'content-type': 'application/json',
			'idempotency-key': 'accept-in-spanish'
		},
		body: '{}'
	});
	expect(answer.status).toBe(200);
	const { body: seen } = await surgeon.get(`/api/threads/${referral.threadId}`);
	expect(seen.items.map((item) => item.body)).toContain('Accepted.');
});
