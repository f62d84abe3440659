import { createServer, type RequestListener, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { db } from '$lib/server/db';
import { outbox } from '$lib/server/db/schema';
import { env } from '$lib/server/env';
import type { Channel, Outgoing } from '$lib/server/outbox/channels/channel';
import { smsChannel } from '$lib/server/outbox/channels/sms';
import { OutboxWorker } from '$lib/server/outbox/worker';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import { startGateway, type Gateway } from '../support/gateway';
import { HOSPITAL_NOW, makeHospital, newPhone, type Hospital } from '../support/hospital';
import { addReminder, addVisit, attemptsOf, rowOf } from '../support/messages';

/** Short, so that the fault 'slow' need not be waited for. */
const LIMIT_MS = 400;

let gateway: Gateway;
let hospital: Hospital;
let channel: Channel;
let cleanUp: () => Promise<void>;

beforeAll(async () => {
	gateway = await startGateway('http://127.0.0.1:4300', 4 * LIMIT_MS);
	const environment = testEnvironment(gateway.env);
	const database = await freshDatabase();
	hospital = await makeHospital();
	const { sms } = env();
	if (!sms) {
		throw new Error('The demonstration has a gateway.');
	}
	channel = smsChannel(sms, `${env().publicUrl}/api/hooks/sms-status`, LIMIT_MS);
	cleanUp = async () => {
		database.close();
		environment.remove();
		await gateway.stop();
	};
});
afterAll(() => cleanUp());

function message(change: Partial<Outgoing> = {}): Outgoing {
	return { id: 'row', to: newPhone(), name: null, subject: null, body: 'A test: ä€ & +1', ...change };
}

describe('the SDK against the stand-in', () => {
	beforeEach(() => gateway.fault('sms', 'ok'));

	it('sends', async () => {
		const given = message();
		const { outcome, code } = await channel.send(given);
		expect(code).toBeNull();
		const [received, ...more] = await gateway.messagesOf(given.to);
		expect(more).toEqual([]);
		expect(received).toMatchObject({ body: given.body, direction: 'out' });
		expect(outcome).toEqual({ kind: 'accepted', id: received?.sid });
	});

	it.each([
		['500', { kind: 'transient', reason: 'gateway-down', retryAfter: null }, '20500', 0],
		['429', { kind: 'transient', reason: 'busy', retryAfter: 1_000 }, '20429', 0],
		['refuse', { kind: 'unknown', reason: 'no-answer' }, 'ECONNRESET', 0],
		['accept-then-drop', { kind: 'unknown', reason: 'no-answer' }, 'ECONNRESET', 1],
		['slow', { kind: 'unknown', reason: 'no-answer' }, 'ECONNABORTED', 1]
	])('%s, once and without a retry of its own', async (mode, outcome, code, arrived) => {
		await gateway.fault('sms', mode);
		const given = message();
		expect(await channel.send(given)).toEqual({ outcome, code });
		expect(await gateway.messagesOf(given.to)).toHaveLength(arrived);
	});

	it.each([
		['no number', { to: '12' }, 'bad-address', '21211'],
		['an empty text', { body: '' }, 'refused', '21602']
	])('%s is refused for good', async (_, change, reason, code) => {
		expect(await channel.send(message(change))).toEqual({ outcome: { kind: 'permanent', reason }, code });
	});

	it('looks up by receiver and text', async () => {
		const given = message();
		expect(await channel.lookUp?.(given)).toEqual([]);
		const first = await channel.send(given);
		await channel.send({ ...given, body: 'Another text.' });
		const found = await channel.lookUp?.(given);
		expect(found).toEqual([first.outcome.kind === 'accepted' && first.outcome.id]);
		await gateway.fault('sms', 'refuse');
		expect(await channel.lookUp?.(given)).toBeNull();
	});
});

describe('answers that are none', () => {
	let server: Server | null = null;

	afterEach(async () => {
		await new Promise((resolve) => (server ? server.close(resolve) : resolve(null)));
		server = null;
	});

	async function gatewayThat(answers: RequestListener): Promise<Channel> {
		const made = createServer(answers);
		server = made;
		await new Promise<void>((resolve) => made.listen(0, '127.0.0.1', resolve));
		const baseUrl = `http://127.0.0.1:${(made.address() as AddressInfo).port}`;
		const account = { accountSid: `AC${'0'.repeat(32)}`, authToken: 'x', from: '+353860000000', baseUrl };
		return smsChannel(account, 'http://127.0.0.1/status', LIMIT_MS);
	}

	/** Fault F13: no body is trusted, and what may have been taken is not called refused. */
	it.each([
		['a page instead of an answer', 200, 'text/html', '<h1>Welcome</h1>', 'unknown'],
		['broken JSON', 201, 'application/json', '{"sid": "SM', 'unknown'],
		['an answer without identifier', 201, 'application/json', '{"status":"queued"}', 'unknown'],
		['a page from something between', 502, 'text/html', '<h1>Bad gateway</h1>', 'transient'],
		['a time-out behind the door', 504, 'text/html', '<h1>Time-out</h1>', 'unknown'],
		['wrong credentials', 401, 'application/json', '{"code":20003,"message":"Authenticate"}', 'transient'],
		['a code that is no number', 400, 'application/json', '{"code":{"a":1}}', 'permanent']
	])('%s', async (_, status, type, body, kind) => {
		const odd = await gatewayThat((_request, response) => {
			response.writeHead(status, { 'Content-Type': type }).end(body);
		});
		expect((await odd.send(message())).outcome.kind).toBe(kind);
	});

	it('does not follow an answer that points elsewhere', async () => {
		const asked: (string | undefined)[] = [];
		const odd = await gatewayThat((request, response) => {
			asked.push(request.url);
			response.writeHead(302, { Location: '/elsewhere' }).end();
		});
		expect((await odd.send(message())).outcome.kind).toBe('permanent');
		expect(asked).toHaveLength(1);
	});

	it('nobody listens', async () => {
		const account = { accountSid: `AC${'0'.repeat(32)}`, authToken: 'x', from: '+353860000000' };
		const nobody = smsChannel(
			{ ...account, baseUrl: 'http://127.0.0.1:4399' },
			'http://127.0.0.1/s',
			LIMIT_MS
		);
		expect(await nobody.send(message())).toEqual({
			outcome: { kind: 'transient', reason: 'not-reached', retryAfter: null },
			code: 'ECONNREFUSED'
		});
	});
});

describe('the outbox against the stand-in', () => {
	let now: number;

	beforeEach(async () => {
		await db().update(outbox).set({ state: 'cancelled' });
		await gateway.fault('sms', 'ok');
		now = HOSPITAL_NOW;
	});

	const worker = () =>
		new OutboxWorker({ channels: { sms: channel, mail: null }, now: () => now, random: () => 0.5 });
	const reminder = async () => addReminder(await addVisit(hospital), hospital.patient.id);
	const arrived = async (id: string) => {
		const { body } = await rowOf(id);
		return (await gateway.messagesOf(hospital.patient.phone)).filter((text) => text.body === body).length;
	};

	it.each(['accept-then-drop', 'slow'])('F2, F11: %s arrives once, and is known to have', async (mode) => {
		const id = await reminder();
		await gateway.fault('sms', mode, 1);
		await worker().settle();
		expect((await rowOf(id)).state).toBe('ready');
		now = (await rowOf(id)).nextAt;
		await worker().settle();
		expect(await rowOf(id)).toMatchObject({ state: 'accepted', attempts: 2 });
		expect((await attemptsOf(id)).map(({ outcome, code }) => [outcome, code])).toEqual([
			['unknown', mode === 'slow' ? 'ECONNABORTED' : 'ECONNRESET'],
			['accepted', 'looked-up']
		]);
		expect(await arrived(id)).toBe(1);
	});

	it.each(['500', '429', 'refuse'])('%s three times, then it goes through, once', async (mode) => {
		const id = await reminder();
		await gateway.fault('sms', mode);
		const sending = worker();
		for (let round = 0; round < 3; round += 1) {
			await sending.settle();
			expect((await rowOf(id)).state).toBe('ready');
			now = (await rowOf(id)).nextAt;
		}
		await gateway.fault('sms', 'ok');
		await sending.settle();
		expect((await rowOf(id)).state).toBe('accepted');
		expect(await arrived(id)).toBe(1);
	});

	it('F12: twenty refusals with a wish to wait slow everything down, and lose and double nothing', async () => {
		const ids = await Promise.all(Array.from({ length: 6 }, reminder));
		await gateway.fault('sms', '429', 20);
		const sending = worker();
		const attemptedAt: number[] = [];
		for (let round = 0; round < 60; round += 1) {
			if ((await sending.settle()) > 0) {
				attemptedAt.push(now);
			}
			now += 500;
		}
		// The stand-in asks for a second each time: between two rounds of attempts lies no less.
		const gaps = attemptedAt.slice(1).map((at, index) => at - (attemptedAt[index] ?? 0));
		expect(Math.min(...gaps)).toBeGreaterThanOrEqual(1_000);
		for (let round = 0; round < 90; round += 1) {
			now += 60_000;
			await sending.settle();
		}
		for (const id of ids) {
			expect((await rowOf(id)).state).toBe('accepted');
			expect(await arrived(id)).toBe(1);
		}
	});
});
