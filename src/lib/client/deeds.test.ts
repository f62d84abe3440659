import { afterEach, describe, expect, it, vi } from 'vitest';
import { ApiProblem } from './api';
import { Deeds, problemWords } from './deeds.svelte';

const PATH = '/api/referrals/r1/accept';

/** Answer each request in turn; an Error stands for no answer at all. */
function answering(...answers: (Response | Error)[]) {
	const keys: string[] = [];
	vi.stubGlobal('fetch', async (_path: string, init: RequestInit) => {
		keys.push(new Headers(init.headers).get('idempotency-key') ?? '');
		const next = answers.shift();
		if (!next || next instanceof Error) {
			throw next;
		}
		return next;
	});
	return keys;
}

const ok = () => new Response('{"id":"r1"}', { status: 200 });
const refused = (status: number, type: string) =>
	new Response(JSON.stringify({ type, detail: 'Somebody was faster.' }), { status });

afterEach(() => vi.unstubAllGlobals());

describe('Deeds', () => {
	it.each([
		['no answer', new Error('gone')],
		['a fault of the server', refused(500, 'internal')],
		['the first request still running', refused(409, 'in-flight')]
	])('keeps the key after %s', async (_, first) => {
		const keys = answering(first, ok());
		const deeds = new Deeds();
		await expect(deeds.post(PATH)).rejects.toBeInstanceOf(ApiProblem);
		await expect(deeds.post(PATH)).resolves.toEqual({ id: 'r1' });
		expect(keys[1]).toBe(keys[0]);
	});

	it.each([
		['a success', ok()],
		['a refusal', refused(409, 'wrong-state')],
		['an invalid body', refused(422, 'invalid')]
	])('makes a new key after %s', async (_, first) => {
		const keys = answering(first, ok());
		const deeds = new Deeds();
		await deeds.post(PATH).catch(() => {});
		await deeds.post(PATH);
		expect(keys[1]).not.toBe(keys[0]);
	});

	it('makes a new key when what is sent has changed', async () => {
		const keys = answering(new Error('gone'), ok());
		const deeds = new Deeds();
		await deeds.post(PATH, { reason: 'one' }).catch(() => {});
		await deeds.post(PATH, { reason: 'other' });
		expect(keys[1]).not.toBe(keys[0]);
	});

	it('knows what is on its way', async () => {
		answering(ok());
		const deeds = new Deeds();
		const sent = deeds.post(PATH);
		expect([deeds.isPending(PATH), deeds.isPending('/api/other')]).toEqual([true, false]);
		await sent;
		expect(deeds.isPending(PATH)).toBe(false);
	});
});

describe('problemWords', () => {
	it('names the fields that are wrong', () => {
		const errors = [{ pointer: '/series/count', message: 'count is 0.' }];
		const problem = new ApiProblem(422, 'invalid', 'Some values are not valid', { errors });
		expect(problemWords(problem).fields).toEqual({ 'series/count': 'count is 0.' });
	});

	it.each([
		[0, 'network', 'No answer: this may not have arrived', false],
		[0, 'offline', 'Not sent: this device has no network', false],
		[503, 'not-ready', 'No answer: this may not have arrived', false],
		[401, 'not-signed-in', 'Not sent: your sign-in has run out', true],
		[409, 'wrong-state', 'Not done', false]
	])('%d %s: %s', (status, code, title, signIn) => {
		expect(problemWords(new ApiProblem(status, code, 'Why.'))).toMatchObject({ title, signIn });
	});

	it('gives the reason of a refusal as the server worded it', () => {
		expect(problemWords(new ApiProblem(409, 'wrong-state', 'It is closed.')).text).toBe('It is closed.');
	});

	it('says who was faster, and when, in the words of the reader', () => {
		const body = { takenBy: { id: 'u', name: 'R. Ferris' }, takenAt: '2026-07-01T14:05:30Z' };
		const error = new ApiProblem(409, 'already-taken', 'In UTC.', body);
		const reader = { zone: 'Europe/Dublin', now: Date.parse('2026-07-01T14:06:00Z') };
		expect(problemWords(error, reader).text).toBe('R. Ferris has it already, since 15:05.');
		expect(problemWords(error).text).toBe('In UTC.');
	});

	it('does not swallow a bug', () => {
		expect(() => problemWords(new TypeError('bug'))).toThrow('bug');
	});
});
