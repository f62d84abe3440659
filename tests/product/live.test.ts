import { connect, type Socket } from 'node:net';
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

/** Events of the past whose some ten megabytes no pair of sockets takes while nobody reads. */
const MORE_THAN_SOCKETS_HOLD = 60_000;

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
	/** How often the stream was asked for; once, when it was never cut. */
	connections = 0;
	#source: EventSource;
	#waiting: (() => void)[] = [];

	constructor(client: Client, query = '') {
		this.#source = new EventSource(`${client.url}/api/live${query}`, {
			fetch: (input, init) => {
				this.connections += 1;
				return fetch(input, { ...init, headers: { ...init.headers, cookie: client.cookie ?? '' } });
			}
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

/** Put many events into the log, as a day away leaves them behind; gives the cursor before them. */
async function fillLog(count: number): Promise<number> {
	await product.kill('SIGTERM');
	await openDatabase(`file:${path.join(product.dataDir, 'ropewalk.db')}`);
	try {
		const before = await currentCursor(db());
		await db().run(sql`
			with recursive n(i) as (select 1 union all select i + 1 from n where i < ${count})
			insert into live_events (at, topic, kind, subject_id, episode_id, unit_id)
			select ${Date.now()}, 'episode', 'admitted', e.id, e.id, e.unit_id
			from n, episodes e where e.id = ${episodeId}`);
		return before;
	} finally {
		closeDatabase();
		await product.restart();
	}
}

/** A client that asks for a stream and reads nothing of it: what comes stays in the socket until that is full. */
function openStalled(client: Client, after: number): Socket {
	const { hostname, port } = new URL(client.url);
	const stalled = connect(Number(port), hostname);
	stalled.on('error', () => {});
	stalled.pause();
	stalled.write(
		`GET /api/live?after=${after} HTTP/1.1\r\nHost: ${hostname}\r\nCookie: ${client.cookie}\r\n\r\n`
	);
	return stalled;
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

	it('refuses a page of somebody else than who is signed in', async () => {
		const me = (await nurse.get('/api/me')).body as { user?: unknown };
		const own = (me.user as { id: string }).id;
		const stop = new AbortController();
		const ask = (as: string) =>
			fetch(`${product.url}/api/live?as=${as}`, {
				headers: { cookie: nurse.cookie ?? '' },
				signal: stop.signal
			});
		const statuses = [(await ask(own)).status, (await ask('somebody-else')).status];
		stop.abort();
		expect(statuses).toEqual([200, 401]);
	});

	it('replays more than may pile up over one connection', async () => {
		const many = 6_000;
		const after = await fillLog(many);
		const listener = new Listener(nurse, `?beats=1&after=${after}`);
		await listener.until(() => listener.heard.length >= many);
		listener.close();
		const ids = listener.heard.slice(0, many).map((event) => event.id);
		expect(ids).toEqual(Array.from({ length: many }, (_, n) => after + 1 + n));
		expect(listener.connections).toBe(1);
	});

	it('cuts a client that stops reading, takes its connection away, and others hear everything', async () => {
		const after = await fillLog(MORE_THAN_SOCKETS_HOLD);
		const listener = new Listener(nurse);
		await listener.opened;
		const stalled = openStalled(nurse, after);
		const closed = new Promise<void>((resolve) => stalled.once('close', () => resolve()));
		let served = 0;
		// To an open connection one can write even without reading from it; to one that was reset one cannot.
		while (!stalled.destroyed) {
			await refer();
			served += 1;
			stalled.write('\r\n');
		}
		await closed;
		await listener.until(() => referrals(listener).length >= served);
		listener.close();
		expect([referrals(listener).length, listener.connections]).toEqual([served, 1]);
		expect(stalled.bytesRead).toBe(0);
		expect(await (await fetch(`${product.url}/metrics`)).text()).toContain(
			'ropewalk_live_readers_cut_total 1\n'
		);
	});

	it('ends within a second of SIGTERM though a client does not read', async () => {
		const after = await fillLog(MORE_THAN_SOCKETS_HOLD);
		const stalled = openStalled(nurse, after);
		const listener = new Listener(nurse);
		await listener.opened;
		// What others are served meanwhile is time enough to fill the socket.
		for (let n = 0; n < 20; n += 1) {
			await refer();
		}
		await listener.until(() => referrals(listener).length === 20);
		const started = performance.now();
		await product.kill('SIGTERM');
		listener.close();
		expect(performance.now() - started).toBeLessThan(1000);
		expect([stalled.bytesRead, stalled.destroyed]).toEqual([0, false]);
		stalled.destroy();
		await product.restart();
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
