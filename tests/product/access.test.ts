import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROLES, type Role } from '$lib/domain/core/codes';
import { Client, signInAs } from '../support/api';
import { apiHandlers } from '../support/route-files';
import { startProduct, type Product } from '../support/server';
import { API, type Row } from './access-table';

const UNKNOWN = '01890000-0000-7000-8000-000000000000';

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

async function call(client: Client, handler: string): Promise<number> {
	const [method = '', address = ''] = handler.split(' ');
	const path = address.replace('[id]', UNKNOWN);
	if (address === '/api/live') {
		const stop = new AbortController();
		const headers = client.cookie ? { cookie: client.cookie } : undefined;
		const response = await fetch(client.url + path, { signal: stop.signal, ...(headers && { headers }) });
		stop.abort();
		return response.status;
	}
	return (await client.send(method, path, method === 'GET' ? undefined : {})).status;
}

describe('every handler of the API', () => {
	it('has its row, and every row its handler', () => {
		expect(Object.keys(API).toSorted()).toEqual(apiHandlers().toSorted());
	});

	// Signing out would end the client's own sign-in for the rows after it; api.test.ts covers it.
	const rows = Object.entries(API).filter(([handler]) => handler !== 'DELETE /api/session');
	describe.each(rows)('%s', (handler, row) => {
		it.each(ROLES)('by a %s', async (role) => {
			const status = await call(clients.get(role) ?? new Client(product.url, null), handler);
			expect(allowed(row, role) ? row.answers : [403]).toContain(status);
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
				const response = await fetch(product.url + address.replace('[id]', UNKNOWN), {
					method,
					headers,
					body: '{}'
				});
				expect([origin, response.status]).toEqual([origin, 403]);
			}
		});
	});
});
