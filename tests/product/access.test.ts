import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROLES, type Role } from '$lib/domain/core/codes';
import { Client, signInAs } from '../support/api';
import { handlers, noHandlers, openFormActions } from '../support/route-files';
import { startProduct, type Product } from '../support/server';
import { API, OPEN_FORMS, OUTSIDE, type Row } from './access-table';

const UNKNOWN = '01890000-0000-7000-8000-000000000000';
/** Shaped like the token of a link, and none. */
const MADE_UP = 'Ab-cdefghijklmnopqrs_t';
/** They end the sign-in that they come with, so each call gets one of its own. */
const ENDING = ['DELETE /api/session', 'POST /sign-out'];

let product: Product;
const clients = new Map<Role, Client>();

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	for (const role of ROLES) {
		clients.set(role, await signInAs(product.url, role));
	}
});
afterAll(() => product?.stop());

function allowed(row: Row, role: Role): boolean {
	return typeof row.roles === 'string' || row.roles.includes(role);
}

function addressOf(handler: string): string {
	return handler.replace(/^\w+ /, '').replace('[id]', UNKNOWN).replace('[token]', MADE_UP);
}

async function call(client: Client, handler: string): Promise<number> {
	const [method = ''] = handler.split(' ');
	const path = addressOf(handler);
	if (path === '/api/live') {
		const stop = new AbortController();
		const headers = client.cookie ? { cookie: client.cookie } : undefined;
		const response = await fetch(client.url + path, { signal: stop.signal, ...(headers && { headers }) });
		stop.abort();
		return response.status;
	}
	return (await client.send(method, path, method === 'GET' ? undefined : {})).status;
}

const ROWS = { ...API, ...OUTSIDE };

describe('every handler', () => {
	it('has its row, and every row its handler', () => {
		expect(Object.keys(ROWS).toSorted()).toEqual(handlers().toSorted());
	});

	describe.each(Object.entries(ROWS))('%s', (handler, row) => {
		it.each(ROLES)('by a %s', async (role) => {
			const ending = ENDING.includes(handler);
			const client = ending ? await signInAs(product.url, role) : clients.get(role);
			const status = await call(client ?? new Client(product.url, null), handler);
			expect(allowed(row, role) ? row.answers : [403]).toContain(status);
			if (ending) {
				expect((await client?.get('/api/me'))?.status).toBe(401);
			}
		});

		it('by nobody', async () => {
			const status = await call(new Client(product.url, null), handler);
			expect(row.roles === 'everyone' ? row.answers : [401]).toContain(status);
		});

		it('from a foreign page', async () => {
			const [method = '', address = ''] = handler.split(' ');
			if (method === 'GET' || row.answers.includes(403) || address === '/api/demo/clock') {
				return expect(handler).toMatch(/^GET|hooks|clock/);
			}
			const { cookie } = clients.get('surgeon') ?? { cookie: null };
			for (const origin of ['https://evil.example', 'null', '']) {
				const headers = {
					'content-type': 'application/json',
					...(cookie && { cookie }),
					...(origin && { origin })
				};
				const response = await fetch(product.url + addressOf(handler), {
					method,
					headers,
					body: '{}'
				});
				expect([origin, response.status]).toEqual([origin, 403]);
			}
		});
	});
});

describe('a method that a route does not have', () => {
	it.each(noHandlers())('%s', async (handler) => {
		const [method = '', route = ''] = handler.split(' ');
		const client = clients.get('surgeon') ?? new Client(product.url, null);
		const { status, headers, body } = await client.send(method, addressOf(handler));
		expect(status).toBe(405);
		const there = handlers().filter((each) => each.endsWith(` ${route}`));
		for (const each of there) {
			expect(headers.get('allow')).toContain(each.split(' ')[0]);
		}
		if (route.startsWith('/api/')) {
			expect(headers.get('content-type')).toBe('application/problem+json');
			expect(body).toMatchObject({ type: 'no-such-method', status: 405 });
		}
	});
});

describe('every form that needs no sign-in', () => {
	it('has its row, and every row its form', () => {
		expect(Object.keys(OPEN_FORMS).toSorted()).toEqual(openFormActions().toSorted());
	});

	/** The status that the action itself gave, as a page with script gets it. */
	async function sent(action: string, fields: Record<string, string>, more: Record<string, string>) {
		const response = await fetch(product.url + action.replace('[token]', MADE_UP), {
			method: 'POST',
			redirect: 'manual',
			headers: { accept: 'application/json', 'x-sveltekit-action': 'true', ...more },
			body: new URLSearchParams(fields)
		});
		const { status } = (await response.json()) as { status?: number };
		return status ?? response.status;
	}

	describe.each(Object.entries(OPEN_FORMS))('%s', (action, { fields, answer, fromNowhere = 403 }) => {
		it.each([...ROLES, null])('by a %s', async (role) => {
			const cookie = role && clients.get(role)?.cookie;
			const headers = { origin: product.url, ...(cookie && { cookie }) };
			expect(await sent(action, fields, headers)).toBe(answer);
		});

		it.each([
			['https://evil.example', 403],
			['null', fromNowhere]
		])('from the page %s', async (origin, status) => {
			expect(await sent(action, fields, { origin })).toBe(status);
		});
	});
});
