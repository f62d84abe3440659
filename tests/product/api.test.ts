import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { admit, Client, newKey, PASSWORD, signInAs, SIGN_INS } from '../support/api';
import { startProduct, type Product } from '../support/server';

let product: Product;
let surgeon: Client;
let therapist: Client;
let nurse: Client;
let coordinator: Client;
let episodeId: string;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	surgeon = await signInAs(product.url, 'surgeon');
	therapist = await signInAs(product.url, 'therapist');
	nurse = await signInAs(product.url, 'nurse');
	coordinator = await signInAs(product.url, 'coordinator');
	episodeId = await admit(surgeon);
});
afterAll(() => product?.stop());

const REFERRAL = { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' };
/** Of a patient of its own each time: a second open one to the same service is refused. */
const refer = async () => surgeon.post(`/api/episodes/${await admit(surgeon)}/referrals`, REFERRAL);

describe('signing in', () => {
	it('answers the person and sets a cookie that scripts cannot read', async () => {
		const answer = await new Client(product.url, null).post('/api/session', {
			email: SIGN_INS.nurse,
			password: PASSWORD
		});
		expect(answer.status).toBe(200);
		expect(answer.body.user).toMatchObject({ role: 'nurse', units: expect.any(Array) });
		const cookie = answer.headers.get('set-cookie') ?? '';
		expect(cookie).toMatch(/HttpOnly/i);
		expect(cookie).toMatch(/SameSite=Lax/i);
		expect(cookie).not.toMatch(/Secure|__Host-/);
	});

	it.each([
		['a wrong password', SIGN_INS.physician, 'not the password'],
		['an unknown address', 'nobody@saltmarsh.example', PASSWORD]
	])('with %s answers the same', async (_, email, password) => {
		const answer = await new Client(product.url, null).post('/api/session', { email, password });
		expect(answer.status).toBe(401);
		expect(answer.headers.get('content-type')).toBe('application/problem+json');
		expect(answer.body).toEqual({
			type: 'sign-in-failed',
			title: 'E-mail address or password is wrong',
			status: 401,
			detail: 'E-mail address or password is wrong'
		});
	});

	it('is open to a program that has no cookie and names no origin, and to no foreign page', async () => {
		const send = (origin: Record<string, string>) =>
			fetch(`${product.url}/api/session`, {
				method: 'POST',
				headers: { 'content-type': 'application/json', ...origin },
				body: JSON.stringify({ email: SIGN_INS.nurse, password: PASSWORD })
			});
		expect((await send({})).status).toBe(200);
		expect((await send({ origin: 'https://evil.example' })).status).toBe(403);
	});

	it('ends with signing out: the cookie is dead', async () => {
		const client = await signInAs(product.url, 'admin');
		expect((await client.send('DELETE', '/api/session')).status).toBe(204);
		expect((await client.get('/api/me')).status).toBe(401);
	});

	it('is slowed after five failures, with the seconds to wait', async () => {
		const guess = () =>
			new Client(product.url, null).post('/api/session', {
				email: 'target@saltmarsh.example',
				password: 'x'
			});
		const statuses = [];
		for (let n = 0; n < 6; n += 1) {
			statuses.push((await guess()).status);
		}
		const last = await guess();
		expect(statuses.slice(0, 5)).toEqual([401, 401, 401, 401, 401]);
		expect(last.status).toBe(429);
		expect(Number(last.headers.get('retry-after'))).toBeGreaterThan(0);
	});
});

describe('bodies', () => {
	const path = () => `/api/episodes/${episodeId}/referrals`;
	it.each([
		['not JSON', '{"service":', 'application/json', 400, 'malformed'],
		['another type', 'service=x', 'application/x-www-form-urlencoded', 415, 'wrong-type'],
		['too large', JSON.stringify({ question: 'x'.repeat(300_000) }), 'application/json', 413, 'too-large'],
		['an unknown field', JSON.stringify({ ...REFERRAL, role: 'admin' }), 'application/json', 422, 'invalid'],
		['a wrong code', JSON.stringify({ ...REFERRAL, service: 'x' }), 'application/json', 422, 'invalid']
	])('%s', async (_, body, type, status, code) => {
		const answer = await surgeon.send('POST', path(), body, { 'content-type': type });
		expect([answer.status, answer.body.type]).toEqual([status, code]);
	});

	it('that are invalid name the field by a JSON Pointer', async () => {
		const answer = await surgeon.post(path(), { ...REFERRAL, question: '' });
		expect(answer.body.errors).toEqual([{ pointer: '/question', message: 'The question is empty.' }]);
	});

	it('of unknown addresses and methods are problems too', async () => {
		expect((await nurse.get('/api/no-such-thing')).body).toMatchObject({ type: 'not-found', status: 404 });
		expect((await nurse.send('DELETE', '/api/episodes')).body).toMatchObject({ status: 405 });
	});
});

describe('a key', () => {
	it('gives the first answer again, refuses another body, and does the work once', async () => {
		const headers = { 'idempotency-key': newKey() };
		const admitted = await admit(surgeon);
		const path = `/api/episodes/${admitted}/referrals`;
		const first = await surgeon.post(path, REFERRAL, headers);
		const again = await surgeon.post(path, { ...REFERRAL }, headers);
		const other = await surgeon.post(path, { ...REFERRAL, question: 'Other' }, headers);
		expect([first.status, again.status]).toEqual([201, 201]);
		expect(again.body).toEqual(first.body);
		expect(first.headers.get('idempotency-replayed')).toBeNull();
		expect(again.headers.get('idempotency-replayed')).toBe('true');
		expect([other.status, other.body.type]).toEqual([422, 'idempotency-mismatch']);
	});

	it('sent five times at once does the work once', async () => {
		const headers = { 'idempotency-key': newKey() };
		const question = `Only once ${newKey()}`;
		const admitted = await admit(surgeon);
		const path = `/api/episodes/${admitted}/referrals`;
		const answers = await Promise.all(
			Array.from({ length: 5 }, () => surgeon.post(path, { ...REFERRAL, question }, headers))
		);
		expect(answers.filter((answer) => ![201, 409].includes(answer.status))).toEqual([]);
		const board = await surgeon.get(`/api/episodes/${admitted}`);
		const asked = board.body.referrals as unknown as { question: string }[];
		expect(asked.filter((referral) => referral.question === question)).toHaveLength(1);
	});
});

describe('the main job', () => {
	it('refer, accept, talk', async () => {
		const { status, body } = await refer();
		expect([status, body]).toEqual([
			201,
			{ id: expect.any(String), threadId: expect.any(String), state: 'asked' }
		]);
		const accepted = await therapist.post(`/api/referrals/${body.id}/accept`);
		expect([accepted.status, accepted.body]).toEqual([200, { id: body.id, state: 'accepted' }]);
		const twice = await therapist.post(`/api/referrals/${body.id}/accept`);
		expect([twice.status, twice.body]).toEqual([
			409,
			expect.objectContaining({ type: 'wrong-state', state: 'accepted' })
		]);
		const entry = await nurse.post(`/api/threads/${body.threadId}/entries`, { body: 'She slept well.' });
		expect([entry.status, entry.body]).toEqual([
			201,
			expect.objectContaining({ seq: 3, strand: 'nursing', body: 'She slept well.', ref: null })
		]);
		const thread = await nurse.get(`/api/threads/${body.threadId}`);
		expect(thread.body.items.map((item) => item.seq)).toEqual([1, 2, 3]);
	});

	it('decline needs its reason', async () => {
		const { body } = await refer();
		expect((await therapist.post(`/api/referrals/${body.id}/decline`)).status).toBe(422);
		const declined = await therapist.post(`/api/referrals/${body.id}/decline`, { reason: 'Not today.' });
		expect(declined.body).toEqual({ id: body.id, state: 'declined' });
	});

	it('ask, give with a limit, and twice is told', async () => {
		const path = `/api/episodes/${episodeId}/clearances`;
		const asked = await therapist.post(path, { kind: 'arm-stage', question: 'Wound dry. May it start?' });
		expect([asked.status, asked.body]).toEqual([
			201,
			{ id: expect.any(String), state: 'asked', evidence: expect.any(Object) }
		]);
		const second = await therapist.post(path, { kind: 'arm-stage', question: 'And now?' });
		expect([second.status, second.body.type]).toEqual([409, 'already-asked']);
		expect((await nurse.post(`/api/clearances/${asked.body.id}/give`)).status).toBe(403);
		const given = await surgeon.post(`/api/clearances/${asked.body.id}/give`, {
			limits: { maxElevationDeg: 90 }
		});
		expect(given.body).toEqual({ id: asked.body.id, state: 'given-with-limits' });
		const third = await therapist.post(path, { kind: 'arm-stage', question: 'Again?' });
		expect([third.status, third.body.type]).toEqual([409, 'already-given']);
	});

	const session = {
		context: { betaBlocked: true, rhythm: 'sinus', sternotomy: true, level: 4, conscious: true },
		before: { hr: 76, sbp: 128, dbp: 74 },
		during: [],
		after: { hr: 86, sbp: 108, dbp: 66 },
		symptoms: [],
		activities: []
	};

	it('assess stores nothing and answers the findings', async () => {
		const answer = await therapist.post('/api/assess', session);
		expect(answer.status).toBe(200);
		expect(answer.body.outcome).toBe('stop');
		expect(answer.body.findings).toContainEqual(
			expect.objectContaining({
				rule: 'systolic-fall',
				grade: 'stop',
				reading: 'after',
				measured: 20,
				limit: 10,
				unit: 'mmHg',
				reason: expect.any(String),
				source: expect.any(String)
			})
		);
	});

	it.each([
		['a systolic not above its diastolic', { sbp: 70, dbp: 70 }],
		['a pulse beyond its bounds', { hr: 251 }],
		['a saturation beyond its bounds', { spo2: 101 }]
	])('assess refuses %s', async (_, before) => {
		expect((await therapist.post('/api/assess', { ...session, before })).status).toBe(422);
	});

	it('record, escalate, take, settle', async () => {
		const times = { startedAt: '2026-01-02T10:00:00Z', endedAt: '2026-01-02T10:20:00Z', level: 4 };
		const recorded = await therapist.post(`/api/episodes/${episodeId}/sessions`, { ...session, ...times });
		expect([recorded.status, recorded.body.findings]).toEqual([201, expect.any(Array)]);
		const raised = await therapist.post(`/api/episodes/${episodeId}/escalations`, {
			grade: 'high',
			situation: 'Pressure fell by 20.',
			background: 'Bypass.',
			assessment: 'Too much.',
			request: 'Please come.',
			sessionId: recorded.body.id
		});
		expect([raised.status, raised.body]).toEqual([
			201,
			{ id: expect.any(String), state: 'raised', chain: expect.any(Array) }
		]);
		const path = `/api/escalations/${raised.body.id}`;
		const more = await therapist.post(`/api/episodes/${episodeId}/escalations`, {
			grade: 'high',
			situation: 'Now dizzy.',
			background: 'Bypass.',
			assessment: 'Worse.',
			request: 'Please come.'
		});
		expect([more.status, more.body]).toEqual([
			200,
			expect.objectContaining({ id: raised.body.id, bundled: true })
		]);
		expect((await therapist.post(`${path}/take`)).status).toBe(403);
		expect((await nurse.get(path)).body).toMatchObject({ state: 'raised', holder: null });
		const taken = await nurse.post(`${path}/take`, { etaMinutes: 2 });
		expect(taken.body).toMatchObject({ id: raised.body.id, state: 'taken', takenBy: expect.any(Object) });
		const late = await surgeon.post(`${path}/take`);
		expect([late.status, late.body]).toEqual([
			409,
			expect.objectContaining({
				type: 'already-taken',
				takenBy: taken.body.takenBy,
				takenAt: taken.body.takenAt
			})
		]);
		expect((await nurse.post(`${path}/arrive`)).body.state).toBe('taken');
		const settled = await nurse.post(`${path}/settle`, {
			outcome: 'Pressure back',
			note: '122/70.',
			recheckMinutes: 15
		});
		expect(settled.body).toEqual({ id: raised.body.id, state: 'settled' });
		const ends = await nurse.get('/api/loose-ends');
		expect(ends.body.mine).toContainEqual(
			expect.objectContaining({ kind: 'recheck', id: raised.body.id, episodeId, unit: 'Tern Ward' })
		);
	});

	it('a session with arm exercise and no clearance is 409 until it comes with its deviation', async () => {
		const other = await admit(surgeon);
		const ago = (minutes: number) => new Date(Date.now() - minutes * 60_000).toISOString();
		const times = { startedAt: ago(30), endedAt: ago(10), level: 5 };
		const body = { ...session, ...times, activities: [{ code: 'arm-exercise', elevationDeg: 60 }] };
		const refused = await therapist.post(`/api/episodes/${other}/sessions`, body);
		expect([refused.status, refused.body.type]).toEqual([409, 'clearance-needed']);
		const deviation = { reason: 'Said by telephone.', verbalFrom: 'the surgeon', readBack: true };
		const recorded = await therapist.post(`/api/episodes/${other}/sessions`, { ...body, deviation });
		expect(recorded.status).toBe(201);
		const ends = await surgeon.get('/api/loose-ends');
		expect(ends.body.mine).toContainEqual(expect.objectContaining({ kind: 'deviation', episodeId: other }));
	});

	it('a bed in use is 409', async () => {
		const bed = `B-${newKey().slice(0, 8)}`;
		await admit(coordinator, { bed });
		await expect(admit(coordinator, { bed })).rejects.toThrow(/409.*bed-in-use/);
	});

	it('book, confirm, and what is over is not confirmed again', async () => {
		const startsAt = new Date(Date.now() + 5 * 86_400_000).toISOString();
		const booked = await coordinator.post(`/api/episodes/${episodeId}/visits`, {
			startsAt,
			minutes: 45,
			place: 'East Gym'
		});
		expect([booked.status, booked.body.items.length]).toEqual([201, 1]);
		const [visit] = booked.body.items;
		const confirmed = await coordinator.post(`/api/visits/${visit?.id}/confirm`);
		expect(confirmed.body).toEqual({ id: visit?.id, state: 'confirmed' });
		await coordinator.post(`/api/visits/${visit?.id}/cancel`, { reason: 'Moved.' });
		expect((await coordinator.post(`/api/visits/${visit?.id}/confirm`)).status).toBe(409);
		const series = {
			from: new Date(Date.now() + 10 * 86_400_000).toISOString().slice(0, 10),
			weekdays: ['mon', 'wed', 'fri'],
			time: '10:00',
			count: 36,
			minutes: 60
		};
		const all = await coordinator.post(`/api/episodes/${episodeId}/visits`, {
			series: { ...series, place: 'East Gym' }
		});
		expect([all.status, all.body.items.length]).toEqual([201, 36]);
	});
});

describe('lists', () => {
	it('are cut into pages whose cursors meet', async () => {
		const seen: string[] = [];
		let after = '';
		for (let n = 0; n < 50; n += 1) {
			const { body } = await nurse.get(`/api/episodes?limit=5${after}`);
			seen.push(...body.items.map((item) => String(item.id)));
			if (body.next === null) {
				break;
			}
			after = `&after=${body.next}`;
		}
		const whole = await nurse.get('/api/episodes?limit=200');
		expect(seen).toEqual(whole.body.items.map((item) => item.id));
	});

	it('clamp the limit and refuse one that is no number', async () => {
		expect((await nurse.get('/api/episodes?limit=99999')).status).toBe(200);
		expect((await nurse.get('/api/episodes?limit=many')).status).toBe(422);
	});

	it('know a unit by id and by name', async () => {
		const byName = await nurse.get('/api/episodes?limit=200&unit=Tern%20Ward');
		const unitId = String(byName.body.items[0]?.unitId);
		const byId = await nurse.get(`/api/episodes?limit=200&unit=${unitId}`);
		expect(byId.body.items.map((item) => item.id)).toEqual(byName.body.items.map((item) => item.id));
	});
});

describe('the description of the API', () => {
	it('is OpenAPI 3.1 and names every handler with its body', async () => {
		const { status, body } = await nurse.get('/api/openapi.json');
		expect([status, body.openapi]).toEqual([200, '3.1.0']);
		const paths = body.paths as unknown as Record<string, Record<string, { requestBody?: object }>>;
		const refer = paths['/api/episodes/{id}/referrals']?.post?.requestBody;
		expect(refer).toMatchObject({
			content: { 'application/json': { schema: { required: ['service', 'priority', 'question'] } } }
		});
		expect(Object.keys(paths)).toContain('/api/escalations/{id}/take');
	});
});

describe('every answer', () => {
	it.each(['/', '/sign-in', '/api/me', '/api/episodes', '/healthz', '/no-such-page'])(
		'of %s carries the headers of a careful server',
		async (path) => {
			const { headers } = await nurse.get(path);
			expect(headers.get('x-content-type-options')).toBe('nosniff');
			expect(headers.get('referrer-policy')).toBe('same-origin');
			expect(headers.get('cache-control')).toContain('no-store');
			expect(headers.get('content-security-policy')).toMatch(/frame-ancestors 'none'/);
			expect(headers.get('content-security-policy')).not.toMatch(/script-src[^;]*unsafe-inline/);
			expect(headers.get('access-control-allow-origin')).toBeNull();
		}
	);

	it.each(['/', '/api/episodes'])(
		'of %s is packed for whoever takes it, and reads the same',
		async (path) => {
			const plain = await nurse.get(path, { 'accept-encoding': 'identity' });
			const packed = await nurse.get(path, { 'accept-encoding': 'gzip' });
			expect(plain.headers.get('content-encoding')).toBeNull();
			expect(packed.headers.get('content-encoding')).toBe('gzip');
			// Whole to its end; what stands before may have passed a minute meanwhile.
			expect(packed.text.slice(-12)).toBe(plain.text.slice(-12));
		}
	);
});
