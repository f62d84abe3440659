import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startProduct, type Product } from '../../support/server';
import { CALL, Makers, signInAll, type People, type Role } from './makers';

let product: Product;
let people: People;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	people = await signInAll(product.url);
});
afterAll(() => product?.stop());

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
				patient: { id: some, name: some, mrn: some, birthDate: '1950-01-31', sex: 'female' },
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
			{
				referral: { state: 'accepted' },
				items: [
					{ seq: 1, kind: 'ask' },
					{ seq: 2, kind: 'answer' },
					{ seq: 3, kind: 'ask', ref: { kind: 'escalation', id: some } }
				],
				next: null
			}
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
		const { episodeId, threadId } = await new Makers(() => people).referral('accepted');
		const raised = await people.therapist.post(`/api/episodes/${episodeId}/escalations`, CALL);
		ids = { episodeId, threadId: String(threadId), escalationId: String(raised.body.id) };
	});

	it.each(READS)('%s answers as written', async (_, path, shape) => {
		const { status, body } = await people.nurse.get(path(ids));
		expect(status).toBe(200);
		expect(body).toMatchObject(shape);
	});

	it('an entry of a thread has what is written', async () => {
		const { items } = (await people.nurse.get(`/api/threads/${ids.threadId}`)).body;
		const WRITTEN = ['at', 'author', 'body', 'id', 'kind', 'ref', 'seq', 'strand'];
		for (const item of items) {
			expect(Object.keys(item)).toEqual(expect.arrayContaining(WRITTEN));
		}
		expect(items[0]).toMatchObject({
			id: expect.any(String),
			at: expect.stringMatching(/^\d{4}-\d\d-\d\dT.*Z$/),
			author: { id: expect.any(String), name: expect.any(String) },
			strand: 'medical',
			body: 'Begin to mobilise.',
			ref: { kind: 'referral', id: expect.any(String) }
		});
	});

	it.each<Role>(['surgeon', 'nurse', 'therapist', 'physician', 'coordinator'])(
		'a %s may contact the patient: the sex and the telephone are told',
		async (role) => {
			const { patient } = (await people[role].get(`/api/episodes/${ids.episodeId}`)).body;
			expect(patient).toMatchObject({ sex: 'female', birthDate: '1950-01-31', phone: null });
		}
	);

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
