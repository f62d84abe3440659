import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROLES, type Role } from '$lib/domain/core/codes';
import { m } from '$lib/i18n/paraglide/messages';
import { Client, signInAs } from '../support/api';
import { pages } from '../support/route-files';
import { startProduct, type Product } from '../support/server';

const CLINICAL: Role[] = ['surgeon', 'physician', 'nurse', 'therapist', 'speech-therapist'];
const SEEING: Role[] = [...CLINICAL, 'coordinator'];
const EVERYBODY: readonly Role[] = ROLES;

/** Who is let into which page behind the sign-in. A page that is missing here fails the test. */
const INSIDE: Record<string, readonly Role[]> = {
	'/loose-ends': EVERYBODY,
	'/loose-ends/[what]/[id]': ['coordinator'],
	'/ward': SEEING,
	'/ward/admit': ['surgeon', 'physician', 'nurse', 'coordinator'],
	'/visits': SEEING,
	'/visits/closed-days': ['coordinator', 'admin'],
	'/cover': EVERYBODY,
	'/rules': EVERYBODY,
	'/rules/calculators': EVERYBODY,
	'/account': EVERYBODY,
	'/admin/limits': ['admin'],
	'/admin/limits/activities': ['admin'],
	'/admin/messages': ['admin'],
	'/admin/messages/[id]': ['admin'],
	'/admin/messages/received': ['admin'],
	'/admin/messages/templates': ['admin'],
	'/admin/accounts': ['admin'],
	'/admin/accounts/[id]': ['admin'],
	'/patients/[id]': SEEING,
	'/patients/[id]/refer': ['surgeon', 'physician'],
	'/patients/[id]/move': ['coordinator', 'nurse', 'physician'],
	'/patients/[id]/details': ['coordinator', 'nurse', 'physician', 'surgeon'],
	'/patients/[id]/threads/[threadId]': SEEING,
	'/patients/[id]/clearances': SEEING,
	'/patients/[id]/clearances/[clearanceId]': SEEING,
	'/patients/[id]/sessions': CLINICAL,
	'/patients/[id]/level': CLINICAL,
	'/patients/[id]/limits': CLINICAL,
	'/patients/[id]/visits': SEEING,
	'/patients/[id]/escalate': CLINICAL,
	'/escalations/[id]': CLINICAL,
	'/bedside/[episodeId]': ['therapist', 'speech-therapist', 'nurse', 'physician']
};
/** Identifiers that lead to something only for these pages; elsewhere an unknown one is 404 to who is let in. */
const UNKNOWN = '01890000-0000-7000-8000-000000000000';

/** Parts of addresses that are words and not identifiers. */
const PARTS: Record<string, string> = { what: 'messages' };

let product: Product;
let known: Record<string, string>;
const clients = new Map<Role, Client>();

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	for (const role of ROLES) {
		clients.set(role, await signInAs(product.url, role));
	}
	const surgeon = clients.get('surgeon') as Client;
	const ends = (await surgeon.get('/api/loose-ends')).body as unknown as {
		mine: { kind: string; id: string; episodeId: string; threadId: string }[];
	};
	const asked = ends.mine.find((end) => end.kind === 'clearance');
	known = {
		id: asked?.episodeId ?? '',
		episodeId: asked?.episodeId ?? '',
		threadId: asked?.threadId ?? '',
		clearanceId: asked?.id ?? ''
	};
});
afterAll(() => product?.stop());

function addressFor(page: string): string {
	const patient = page.startsWith('/patients') || page.startsWith('/bedside');
	return page.replaceAll(/\[(\w+)\]/g, (_, name: string) => (patient ? known[name] : PARTS[name]) ?? UNKNOWN);
}

describe('every page behind the sign-in', () => {
	it('has its row, and every row its page', () => {
		const inside = pages().filter((page) => page.group === 'app');
		expect(Object.keys(INSIDE).toSorted()).toEqual(inside.map((page) => page.address).toSorted());
	});

	describe.each(Object.entries(INSIDE))('%s', (page, roles) => {
		const own = page.startsWith('/patients') || page.startsWith('/bedside') || !page.includes('[');
		it.each(ROLES)('for a %s', async (role) => {
			const { status } = (await clients.get(role)?.get(addressFor(page))) ?? { status: 0 };
			const letIn = roles.includes(role);
			// An identifier that leads nowhere may be hidden from a role before the role is refused.
			const refused = own ? [403] : [403, 404];
			expect(letIn ? [own ? 200 : 404] : refused).toContain(status);
		});

		it('for nobody leads to the sign-in, also by its data', async () => {
			const nobody = new Client(product.url, null);
			const onward = `/sign-in?next=${encodeURIComponent(addressFor(page))}`;
			const { status, headers } = await nobody.get(addressFor(page));
			expect([status, headers.get('location')]).toEqual([303, onward]);
			// Nothing but where to go: no node of data beside it.
			const data = await nobody.get(`${addressFor(page)}/__data.json`);
			expect([data.status, data.body]).toEqual([200, { type: 'redirect', location: onward }]);
		});
	});
});

describe('what the product is not', () => {
	it.each(['/', '/sign-in'])(
		'stands on %s, for who comes without script and without a sign-in',
		async (page) => {
			const { status, text } = await new Client(product.url, null).get(page);
			expect(status).toBe(200);
			for (const words of [
				m.common_use_is_text(),
				m.common_use_not_title(),
				m.common_use_not_text(),
				m.common_use_emergency_text()
			]) {
				expect(text).toContain(words);
			}
		}
	);

	it('is said in words that deny a monitor, an alarm, prescribing and the legal record', () => {
		const said = `${m.common_use_not_title()} ${m.common_use_not_text()}`;
		for (const denied of ['monitor', 'alarm system', 'prescribing system', 'legal patient record']) {
			expect(said).toContain(denied);
		}
	});
});
