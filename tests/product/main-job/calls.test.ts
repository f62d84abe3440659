import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { newKey, type Answer } from '../../support/api';
import { startProduct, type Product } from '../../support/server';
import type { Call } from './call';
import { mainJob } from './calls';
import { Makers, signInAll, type People } from './makers';

let product: Product;
let people: People;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	people = await signInAll(product.url);
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
		expect([first.status, first.body]).toEqual([call.answer.status, call.answer.body]);
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
		expect((await send(call, path, bodyOf(call))).status).toBe(call.answer.status);
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

describe('two who give a clearance at once', () => {
	it('do not overwrite each other: one is answered, the other told who was faster', async () => {
		const { id } = await new Makers(() => people).clearance('asked');
		const path = `/api/clearances/${id}/give`;
		const bodies = [{ limits: { maxMinutes: 5 } }, {}];
		const answers = await Promise.all(bodies.map((body) => people.surgeon.post(path, body)));
		const now = (await people.surgeon.get(`/api/clearances/${id}`)).body;
		expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
		const [won, lost] = [...answers].sort((one, other) => one.status - other.status);
		expect(won?.body).toEqual({ id, state: now.state });
		const { state, decidedBy, decidedAt } = now;
		expect(lost?.body).toMatchObject({ type: 'wrong-state', state, decidedBy, decidedAt });
		expect(decidedBy).toEqual(expect.any(String));
	});
});
