import { connect } from 'node:net';
import path from 'node:path';
import { sql } from 'drizzle-orm';
import { EventSource } from 'eventsource';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase, db, openDatabase } from '$lib/server/db';
import { currentCursor } from '$lib/server/live/log';
import type { Client } from '../support/api';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';

let product: Product;
let surgeon: Client;
let nurse: Client;
let episodeId: string;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	surgeon = await signInAs(product.url, 'surgeon');
	nurse = await signInAs(product.url, 'nurse');
	episodeId = await admit(surgeon);
});
afterAll(() => product?.stop());

interface Heard {
	id: number;
	topic: string;
	kind: string;
	episodeId: string;
}

/** A listener with the library that speaks as a browser does; `until` resolves when enough was heard. */
class Listener {
	readonly heard: Heard[] = [];
	resets = 0;
	#source: EventSource;
	#waiting: (() => void)[] = [];

	constructor(client: Client, query = '') {
		this.#source = new EventSource(`${client.url}/api/live${query}`, {
			fetch: (input, init) =>
				fetch(input, { ...init, headers: { ...init.headers, cookie: client.cookie ?? '' } })
		});
		this.#source.addEventListener('change', ({ data, lastEventId }) => {
			this.heard.push({ ...(JSON.parse(data) as Heard), id: Number(lastEventId) });
			this.#waiting.forEach((wake) => wake());
		});
		this.#source.addEventListener('reset', () => {
			this.resets += 1;
			this.#waiting.forEach((wake) => wake());
		});
	}

	get opened(): Promise<void> {
		return this.#source.readyState === EventSource.OPEN
			? Promise.resolve()
			: new Promise((resolve) => this.#source.addEventListener('open', () => resolve(), { once: true }));
	}

	async until(enough: () => boolean): Promise<void> {
		while (!enough()) {
			await new Promise<void>((resolve) => this.#waiting.push(resolve));
		}
	}

	close(): void {
		this.#source.close();
	}
}

/** Many events of the past, more than sockets hold, so that a client can fall behind; gives the cursor before them. */
async function fillLog(count: number): Promise<number> {
	await product.kill('SIGTERM');
	await openDatabase(`file:${path.join(product.dataDir, 'ropewalk.db')}`);
	const before = await currentCursor(db());
	try {
		await db().run(sql`
			with recursive n(i) as (select 1 union all select i + 1 from n where i < ${count})
			insert into live_events (at, topic, kind, subject_id, episode_id, unit_id)
			select ${Date.now()}, 'episode', 'admitted', ${episodeId}, ${episodeId},
				(select unit_id from episodes where id = ${episodeId}) from n`);
	} finally {
		closeDatabase();
	}
	await product.restart();
	return before;
}

async function metric(name: string): Promise<number> {
	const text = await (await fetch(`${product.url}/metrics`)).text();
	return Number(new RegExp(`^${name} (\\d+)$`, 'm').exec(text)?.[1]);
}

/** Of a patient of its own each time: a second open one to the same service is refused. */
const refer = async () =>
	surgeon.post(`/api/episodes/${await admit(surgeon)}/referrals`, {
		service: 'physiotherapy',
		priority: 'soon',
		question: 'Live?'
	});
const referrals = (listener: Listener) => listener.heard.filter((event) => event.topic === 'referral');

describe('the live stream', () => {
	it('tells identifiers only, with growing ids', async () => {
		const listener = new Listener(nurse);
		await listener.opened;
		const { body } = await refer();
		await listener.until(() => listener.heard.some((event) => event.topic === 'thread'));
		listener.close();
		const ids = listener.heard.map((event) => event.id);
		expect(ids).toEqual(ids.toSorted((a, b) => a - b));
		expect(referrals(listener)[0]).toMatchObject({
			topic: 'referral',
			kind: 'asked',
			episodeId: expect.any(String)
		});
		expect(Object.keys(referrals(listener)[0] ?? {}).toSorted()).toEqual([
			'episodeId',
			'id',
			'kind',
			'topic'
		]);
		expect(JSON.stringify(listener.heard)).not.toContain('Live?');
		expect(body.state).toBe('asked');
	});

	it('resumes after a restart without a gap and without a double', async () => {
		const listener = new Listener(nurse);
		await listener.opened;
		await refer();
		await listener.until(() => referrals(listener).length === 1);
		await product.kill();
		await product.restart();
		for (let n = 0; n < 5; n += 1) {
			await refer();
		}
		await listener.until(() => referrals(listener).length >= 6);
		listener.close();
		const ids = referrals(listener).map((event) => event.id);
		expect(new Set(ids).size).toBe(6);
	});

	it('gives everything after a cursor to who asks with ?after=', async () => {
		const first = new Listener(nurse);
		await first.opened;
		await refer();
		await first.until(() => referrals(first).length === 1);
		first.close();
		await refer();
		const cursor = first.heard.at(-1)?.id ?? 0;
		const second = new Listener(nurse, `?after=${cursor}`);
		await second.until(() => referrals(second).length === 1);
		second.close();
		expect(second.heard.every((event) => event.id > cursor)).toBe(true);
	});

	it.each([['99999999'], ['999999999999']])(
		'says reset for the cursor %s, which it never gave',
		async (after) => {
			const listener = new Listener(nurse, `?after=${after}`);
			await listener.until(() => listener.resets === 1);
			listener.close();
			expect(listener.heard).toEqual([]);
		}
	);

	it('refuses a cursor that is no number', async () => {
		expect((await nurse.get('/api/live?after=x')).status).toBe(400);
	});

	it('tells a coordinator nothing of an escalation', async () => {
		const coordinator = await signInAs(product.url, 'coordinator');
		const listener = new Listener(coordinator);
		await listener.opened;
		const therapist = await signInAs(product.url, 'therapist');
		await therapist.post(`/api/episodes/${episodeId}/escalations`, {
			grade: 'low',
			situation: 's',
			background: 'b',
			assessment: 'a',
			request: 'r'
		});
		await refer();
		await listener.until(() => referrals(listener).length === 1);
		listener.close();
		expect(listener.heard.map((event) => event.topic)).not.toContain('escalation');
	});

	it('ends when its person signs out', async () => {
		const physician = await signInAs(product.url, 'physician');
		const response = await fetch(`${product.url}/api/live`, { headers: { cookie: physician.cookie ?? '' } });
		const reader = response.body?.getReader();
		await physician.send('DELETE', '/api/session');
		let done = false;
		while (!done) {
			({ done } = (await reader?.read()) ?? { done: true });
		}
		expect(done).toBe(true);
	});

	it('is not slowed for others by a client that stops reading', async () => {
		const { hostname, port } = new URL(product.url);
		const stalled = connect(Number(port), hostname);
		stalled.write(
			`GET /api/live?after=0 HTTP/1.1\r\nHost: ${hostname}\r\nCookie: ${nurse.cookie}\r\nConnection: close\r\n\r\n`
		);
		stalled.pause();
		const closed = new Promise<void>((resolve) => stalled.once('close', () => resolve()));
		stalled.on('error', () => {});
		const listener = new Listener(nurse);
		await listener.opened;
		const before = referrals(listener).length;
		for (let n = 0; n < 20; n += 1) {
			await refer();
		}
		await listener.until(() => referrals(listener).length >= before + 20);
		expect(referrals(listener).length).toBe(before + 20);
		listener.close();
		stalled.destroy();
		await closed;
	});

	it('cuts a client that stops reading, takes its connection away, and others hear on', async () => {
		const after = await fillLog(120_000);
		const listener = new Listener(nurse);
		await listener.opened;
		const before = await metric('ropewalk_live_readers_cut_total');
		const { hostname, port } = new URL(product.url);
		const stalled = connect(Number(port), hostname);
		stalled.write(
			`GET /api/live?after=${after} HTTP/1.1\r\nHost: ${hostname}\r\nCookie: ${nurse.cookie}\r\n\r\n`
		);
		stalled.pause();
		stalled.on('error', () => {});
		const closed = new Promise<void>((resolve) => stalled.once('close', () => resolve()));
		// The others are served meanwhile; each answer is also a moment in which the reader is still not reading.
		let served = 0;
		while ((await metric('ropewalk_live_readers_cut_total')) === before) {
			await refer();
			served += 1;
		}
		await listener.until(() => referrals(listener).length >= served);
		listener.close();
		// A connection that was only let go of would stay open here for the next request.
		stalled.resume();
		await closed;
		expect(served).toBeGreaterThan(0);
		expect(stalled.bytesRead).toBeLessThan(120_000 * 50);
	});

	it('ends within a second of SIGTERM, and the server with it', async () => {
		const response = await fetch(`${product.url}/api/live`, { headers: { cookie: nurse.cookie ?? '' } });
		const reader = response.body?.getReader();
		await reader?.read();
		const started = performance.now();
		const stopped = product.kill('SIGTERM');
		let done = false;
		while (!done) {
			({ done } = (await reader?.read().catch(() => ({ done: true }))) ?? { done: true });
		}
		expect(performance.now() - started).toBeLessThan(1000);
		await stopped;
		await product.restart();
		expect((await nurse.get('/api/me')).status).toBe(200);
	});
});
