import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { newKey, signInAs, type Answer } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { mainJob, Makers, type Call, type People, type Role } from './main-job-table';

let product: Product;
let people: People;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	const as = (role: Role) => signInAs(product.url, role);
	people = {
		surgeon: await as('surgeon'),
		nurse: await as('nurse'),
		therapist: await as('therapist'),
		physician: await as('physician'),
		coordinator: await as('coordinator')
	};
});
afterAll(() => product?.stop());

const bodyOf = ({ body }: Call) => (typeof body === 'function' ? body() : body);
const told = ({ status, body }: Answer) => [status, body.type];

const CALLS = mainJob(() => people);
const send = (call: Call, path: string, body: unknown, key = newKey()) =>
	people[call.by].post(path, body, { 'idempotency-key': key });

describe.each(CALLS)('$name', (call) => {
	it('is done once for a key, and refuses another body under it', async () => {
		const [path, key] = [await call.path(), newKey()];
		const first = await send(call, path, bodyOf(call), key);
		const again = await send(call, path, bodyOf(call), key);
		expect([200, 201]).toContain(first.status);
		expect(first.headers.get('idempotency-replayed')).toBeNull();
		expect([again.status, again.body]).toEqual([first.status, first.body]);
		expect(again.headers.get('idempotency-replayed')).toBe('true');
		const other = await send(call, path, call.other ?? { more: true }, key);
		expect(told(other)).toEqual([422, call.other ? 'idempotency-mismatch' : 'invalid']);
	});

	it('names what is wrong with a body, and does nothing', async () => {
		const path = await call.path();
		expect(told(await send(call, path, '{"half":'))).toEqual([400, 'malformed']);
		const unknown = await send(call, path, call.bad ?? { ...bodyOf(call), noSuchField: 1 });
		expect(told(unknown)).toEqual([422, 'invalid']);
		expect(unknown.body.errors).toEqual([expect.objectContaining({ message: expect.any(String) })]);
		expect([200, 201]).toContain((await send(call, path, bodyOf(call))).status);
	});

	it('comes from a page of ours or not at all', async () => {
		const path = await call.path();
		const { cookie } = people[call.by];
		for (const origin of [null, 'https://evil.example']) {
			const headers = { 'content-type': 'application/json', ...(cookie && { cookie }) };
			const response = await fetch(product.url + path, {
				method: 'POST',
				headers: { ...headers, ...(origin && { origin }) },
				body: JSON.stringify(bodyOf(call))
			});
			const { type } = (await response.json()) as { type: string };
			expect([response.status, type]).toEqual([403, 'foreign-origin']);
		}
	});
});

describe.each(CALLS.filter(({ wrong }) => wrong !== null))('$name', (call) => {
	it('is 409 in another state, and says which', async () => {
		const path = (await call.wrong?.()) ?? '';
		const { status, body } = await send(call, path, bodyOf(call));
		expect(status).toBe(409);
		// Where something stands already, its kind says so; else the state is named.
		const known = ['already-asked', 'already-taken'].includes(String(body.type));
		expect(known ? body.type : body.state).toEqual(expect.any(String));
		expect(known || body.type === 'wrong-state').toBe(true);
	});
});

describe('what is read', () => {
	const some = expect.anything();
	const READS: [string, (ids: Ids) => string, Record<string, unknown>][] = [
		[
			'/api/me',
			() => '/api/me',
			{ user: { id: some, name: some, role: 'nurse' }, units: some, permissions: some }
		],
		['/api/loose-ends', () => '/api/loose-ends', { mine: expect.any(Array), theirs: expect.any(Array) }],
		[
			'/api/episodes/:id',
			({ episodeId }) => `/api/episodes/${episodeId}`,
			{
				id: some,
				patient: { id: some, name: some, mrn: some, birthDate: some },
				referrals: [{ id: some, service: 'physiotherapy', state: 'accepted', threadId: some }],
				threads: [{ id: some, service: 'physiotherapy', state: 'accepted' }],
				clearances: expect.any(Array),
				visits: [],
				mayDoNow: some
			}
		],
		[
			'/api/threads/:id',
			({ threadId }) => `/api/threads/${threadId}`,
			{ referral: { state: 'accepted' }, next: null }
		],
		[
			'/api/escalations/:id',
			({ escalationId }) => `/api/escalations/${escalationId}`,
			{ grade: 'high', state: 'raised', holder: null, steps: expect.any(Array), next: { step: 1, at: some } }
		]
	];
	interface Ids {
		episodeId: string;
		threadId: string;
		escalationId: string;
	}
	let ids: Ids;
	beforeAll(async () => {
		const make = new Makers(() => people);
		const episodeId = await make.episode();
		const refer = { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' };
		const { body } = await people.surgeon.post(`/api/episodes/${episodeId}/referrals`, refer);
		await people.therapist.post(`/api/referrals/${body.id}/accept`);
		const call = { grade: 'high', situation: 's', background: 'b', assessment: 'a', request: 'r' };
		const raised = await people.therapist.post(`/api/episodes/${episodeId}/escalations`, call);
		ids = { episodeId, threadId: String(body.threadId), escalationId: String(raised.body.id) };
	});

	it.each(READS)('%s answers as written', async (_, path, shape) => {
		const { status, body } = await people.nurse.get(path(ids));
		expect([status, body]).toEqual([200, expect.objectContaining({})]);
		expect(body).toMatchObject(shape);
	});

	it('a loose end and a row of the ward have what is written', async () => {
		const { mine } = (await people.nurse.get('/api/loose-ends')).body as unknown as { mine: object[] };
		const LOOSE = ['bed', 'due', 'episodeId', 'grade', 'id', 'kind', 'patientName', 'since', 'title', 'unit'];
		expect(Object.keys(mine[0] ?? {})).toEqual(expect.arrayContaining(LOOSE));
		const { items, next } = (await people.nurse.get('/api/episodes?limit=1')).body;
		const ROW = [
			'bed',
			'betaBlocked',
			'id',
			'level',
			'looseEnds',
			'operatedAt',
			'patient',
			'postOpDay',
			'procedure'
		];
		expect(Object.keys(items[0] ?? {})).toEqual(expect.arrayContaining([...ROW, 'unit']));
		expect(next).toEqual(expect.any(String));
	});
});
