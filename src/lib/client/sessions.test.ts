import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { ApiProblem } from './api';
import { sendSession } from './sessions';

const BODY = { level: 4 } as SessionBody;
const answer = (status: number, body: unknown) => () =>
	Promise.resolve(new Response(JSON.stringify(body), { status }));
const noAnswer = () => Promise.reject(new TypeError('Failed to fetch'));

beforeEach(() => void vi.useFakeTimers());
afterEach(() => {
	vi.useRealTimers();
	vi.unstubAllGlobals();
});

describe('sendSession', () => {
	it('sends body and key, and gives the findings', async () => {
		const fetcher = vi.fn(answer(201, { id: 's1', findings: [], outcome: 'clear' }));
		vi.stubGlobal('fetch', fetcher);
		await expect(sendSession('e1', BODY, 'k1')).resolves.toEqual({
			kind: 'recorded',
			recorded: { id: 's1', findings: [], outcome: 'clear' }
		});
		const [path, init] = fetcher.mock.calls[0] as unknown as [string, RequestInit];
		expect(path).toBe('/api/episodes/e1/sessions');
		expect(init.body).toBe(JSON.stringify(BODY));
		expect(new Headers(init.headers).get('idempotency-key')).toBe('k1');
	});

	it('names the clearances that are needed', async () => {
		vi.stubGlobal('fetch', answer(409, { type: 'clearance-needed', needed: ['arm-stage'] }));
		await expect(sendSession('e1', BODY, 'k1')).resolves.toEqual({
			kind: 'clearance-needed',
			kinds: ['arm-stage']
		});
	});

	it.each([
		['no network', noAnswer],
		['a fault of the server', answer(500, { type: 'internal' })],
		['the first one still running', answer(409, { type: 'in-flight' })]
	])('counts %s as unanswered', async (_, fetcher) => {
		vi.stubGlobal('fetch', fetcher);
		await expect(sendSession('e1', BODY, 'k1')).resolves.toEqual({ kind: 'unanswered' });
	});

	it('does not wait for ever', async () => {
		vi.stubGlobal('fetch', () => new Promise(() => {}));
		const sent = sendSession('e1', BODY, 'k1');
		await vi.advanceTimersByTimeAsync(20_000);
		await expect(sent).resolves.toEqual({ kind: 'unanswered' });
	});

	it.each([
		[422, 'invalid'],
		[401, 'not-signed-in'],
		[409, 'wrong-state']
	])('hands on a refusal (%i %s)', async (status, type) => {
		vi.stubGlobal('fetch', answer(status, { type, detail: 'Why.' }));
		const sent = await sendSession('e1', BODY, 'k1');
		expect(sent).toEqual({ kind: 'refused', problem: expect.any(ApiProblem) });
		expect(sent).toMatchObject({ problem: { status, code: type, detail: 'Why.' } });
	});
});
