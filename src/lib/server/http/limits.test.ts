import { describe, expect, it, vi } from 'vitest';
import { countedFor, countRequest, linkTokenIn } from './limits';

vi.mock('../env', () => ({ env: () => ({ rateLimitScale: 1 }) }));

const get = (pathname: string) => ({ method: 'GET', pathname });
const post = (pathname: string) => ({ method: 'POST', pathname });
const TOKEN = 'Ab-cdefghijklmnopqrs_t';

describe('a request counts for', () => {
	it.each([
		['a person wherever they are', get('/ward'), 'p1', '192.0.2.7', null, 'p1'],
		['its address when nobody is signed in', get('/sign-in'), null, '192.0.2.7', null, '192.0.2.7'],
		['nobody in particular without either', get('/sign-in'), null, null, null, 'nobody'],
		['the link of a call', get(`/t/${TOKEN}`), null, '192.0.2.7', TOKEN, `link:${TOKEN}`],
		['that link, signed in too', get(`/t/${TOKEN}/state`), 'p1', '192.0.2.7', TOKEN, `link:${TOKEN}`],
		['nothing when it takes a call', post(`/t/${TOKEN}`), null, '192.0.2.7', TOKEN, null],
		['its address when its link is made up', get(`/t/${TOKEN}`), null, '192.0.2.7', null, '192.0.2.7'],
		['its address when it posts to one', post(`/t/${TOKEN}`), null, '192.0.2.7', null, '192.0.2.7'],
		['its person when they make one up', get(`/t/${TOKEN}`), 'p1', '192.0.2.7', null, 'p1'],
		['nothing when it is the gateway', post('/api/hooks/sms'), null, '192.0.2.7', null, null],
		['nothing when it asks for health', get('/healthz'), null, '192.0.2.7', null, null],
		['its address where health is only a prefix', get('/healthz/x'), null, '192.0.2.7', null, '192.0.2.7'],
		['its address on other posts', post('/sign-in'), null, '192.0.2.7', null, '192.0.2.7']
	])('%s', (_, request, person, address, link, whom) => {
		expect(countedFor(request, person, address, link)).toBe(whom);
	});
});

describe('an address holds the link of a call', () => {
	it.each([
		[`/t/${TOKEN}`, TOKEN],
		[`/t/${TOKEN}/state`, TOKEN],
		[`/t/${TOKEN}/__data.json`, TOKEN],
		[`/t/${TOKEN.slice(1)}`, null],
		[`/t/${TOKEN}x`, null],
		[`/t/${'x'.repeat(5000)}`, null],
		[`/t/${TOKEN.replace('-', '.')}`, null],
		[`/x/t/${TOKEN}`, null],
		['/t/', null],
		['/ward', null]
	])('%s: %s', (pathname, token) => {
		expect(linkTokenIn(pathname)).toBe(token);
	});
});

describe('the limit', () => {
	// The product's own figure: 100 requests in 10 seconds.
	it('refuses the 101st in its ten seconds, says how long to wait, and nobody else', () => {
		for (let n = 0; n < 100; n += 1) {
			countRequest('p1', 1_000);
		}
		expect(() => countRequest('p1', 5_001)).toThrow(
			expect.objectContaining({ code: 'too-many', extra: { retryAfterSeconds: 6 } })
		);
		expect(() => countRequest('p2', 5_001)).not.toThrow();
		expect(() => countRequest('p1', 10_999)).toThrow();
		expect(() => countRequest('p1', 11_000)).not.toThrow();
	});
});
