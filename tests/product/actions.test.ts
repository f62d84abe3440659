import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROLES, type Role } from '$lib/domain/core/codes';
import { signInAs, type Client } from '../support/api';
import { formActions } from '../support/route-files';
import { startProduct, type Product } from '../support/server';
import { ACTIONS, UNKNOWN, type ActionRow } from './actions-table';

let product: Product;
let known: Record<string, string>;
const clients = new Map<Role, Client>();

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	for (const role of ROLES) {
		clients.set(role, await signInAs(product.url, role));
	}
	const ends = (await clients.get('surgeon')?.get('/api/loose-ends'))?.body as unknown as {
		mine: { kind: string; id: string; episodeId: string; threadId: string }[];
	};
	const asked = ends.mine.find((end) => end.kind === 'clearance');
	known = { id: asked?.episodeId ?? '', threadId: asked?.threadId ?? '', clearanceId: asked?.id ?? '' };
});
afterAll(() => product?.stop());

function addressFor(action: string): string {
	const ofPatient = action.startsWith('/patients');
	return action
		.replace('[what]', 'messages')
		.replaceAll(/\[(\w+)\]/g, (_, name: string) => (ofPatient ? (known[name] ?? UNKNOWN) : UNKNOWN));
}

function post(action: string, { fields }: ActionRow, more: Record<string, string>): Promise<Response> {
	return fetch(product.url + addressFor(action), {
		method: 'POST',
		redirect: 'manual',
		headers: { origin: product.url, ...more },
		body: new URLSearchParams(fields)
	});
}

/** The status that the action itself gave, as a page with script gets it: the page around it decides nothing. */
async function statusFor(action: string, row: ActionRow, cookie: string | null): Promise<number> {
	const scripted = { accept: 'application/json', 'x-sveltekit-action': 'true' };
	const response = await post(action, row, { ...scripted, ...(cookie && { cookie }) });
	const { status } = (await response.json()) as { status?: number };
	return status ?? response.status;
}

describe('every form action behind the sign-in', () => {
	it('has its row, and every row its action', () => {
		expect(Object.keys(ACTIONS).toSorted()).toEqual(formActions().toSorted());
	});

	describe.each(Object.entries(ACTIONS))('%s', (action, row) => {
		it.each(ROLES)('by a %s', async (role) => {
			const status = await statusFor(action, row, clients.get(role)?.cookie ?? null);
			if (row.roles === 'signed-in' || row.roles.includes(role)) {
				// Done, led on, nothing there, another state, or a field that does not fit: the role was let in.
				return expect([200, 303, 404, 409, 422]).toContain(status);
			}
			expect(status).toBe(403);
		});

		it('by nobody is 401, with script and without', async () => {
			expect(await statusFor(action, row, null)).toBe(401);
			const page = await post(action, row, { accept: 'text/html' });
			expect(page.status).toBe(401);
			expect(await page.text()).toContain('signInTo');
		});

		it('from a foreign page is refused', async () => {
			const cookie = clients.get('surgeon')?.cookie ?? '';
			for (const origin of ['https://evil.example', 'null']) {
				expect((await post(action, row, { cookie, origin })).status).toBe(403);
			}
		});
	});
});
