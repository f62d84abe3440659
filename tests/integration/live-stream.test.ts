import { setImmediate as turn } from 'node:timers/promises';
import { sql } from 'drizzle-orm';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { db, transact } from '$lib/server/db';
import { liveEvents } from '$lib/server/db/schema';
import { guardedStream, type Sink } from '$lib/server/live/guarded';
import { droppedListeners, listen, publish } from '$lib/server/live/hub';
import { appendLive, canResume, currentCursor, forgetOldEvents, LIVE_HISTORY_MS } from '$lib/server/live/log';
import { cutReaders, ENDING_MS, MAX_QUEUED_BYTES, ROOM_BYTES, STALLED_MS } from '$lib/server/live/pipe';
import { mayHear, openStream } from '$lib/server/live/stream';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
afterEach(() => vi.useRealTimers());

const stillGood = () => Promise.resolve(true);

const change = (cursor: number, id = 'x') =>
	({ kind: 'change', cursor, event: { topic: 'thread', kind: 'entry', id, episodeId: null } }) as const;

/** Wait, turn by turn of the event loop, until something holds; a test that waits in vain runs into its time limit. */
async function eventually(holds: () => boolean): Promise<void> {
	while (!holds()) {
		await turn();
	}
}

function openGuarded(options: { beats?: boolean } = {}) {
	let given: Sink | null = null;
	let stopped = 0;
	let dropped = 0;
	const response = guardedStream(
		(sink) => {
			given = sink;
			return () => (stopped += 1);
		},
		() => Promise.resolve(true),
		{ ...options, dropConnection: () => (dropped += 1) }
	);
	const sink = given as Sink | null;
	if (!sink) {
		throw new Error('The stream did not start.');
	}
	return { response, sink, send: sink.send, end: sink.end, stops: () => stopped, drops: () => dropped };
}

/** The bytes of one change as they wait for a reader. */
const CHANGE_BYTES =
	'id: 1000\nevent: change\ndata: {"topic":"thread","kind":"entry","id":"x","episodeId":null}\n\n'.length;

/** Send as many changes as there is place for in so many bytes. */
function fill(sink: Sink, bytes: number): void {
	for (let n = 0; n < Math.floor(bytes / CHANGE_BYTES); n += 1) {
		sink.send(change(1000 + n));
	}
}

async function readUntil(response: Response, wanted: RegExp): Promise<string> {
	const reader = response.body?.getReader();
	const decoder = new TextDecoder();
	const parts: string[] = [];
	let tail = '';
	while (!wanted.test(tail)) {
		// As a server writes to a socket: when that is full, the event loop turns before there is room.
		await turn();
		const part = await reader?.read();
		if (!part || part.done) {
			break;
		}
		const text = decoder.decode(part.value);
		parts.push(text);
		tail = (tail + text).slice(-500);
	}
	reader?.releaseLock();
	return parts.join('');
}

describe('one guarded stream', () => {
	it('puts the log’s cursor into the id line and sends JSON alone', async () => {
		const { response, send, end } = openGuarded();
		send(change(42, 'with\nnew line\r'));
		const text = await readUntil(response, /new line/);
		expect(text).toContain('id: 42\nevent: change\ndata: {"topic":"thread"');
		expect(text).toContain('with\\nnew line\\r');
		end();
	});

	it('tells a page that asked for beats the server’s instant, without an id that would move its place', async () => {
		const { response, send, end } = openGuarded({ beats: true });
		send(change(42));
		const text = await readUntil(response, /event: beat/);
		const block = text.split('\n\n').find((each) => each.includes('event: beat'));
		expect(block).toMatch(/^event: beat\ndata: \d{13}$/);
		end();
	});

	it('sends other programs nothing but what the contract names', async () => {
		const { response, send, end } = openGuarded();
		send(change(42));
		end();
		const text = await readUntil(response, /never/);
		expect(text.match(/^event: .*$/gm)).toEqual(['event: change']);
	});

	it('lets a reader fall behind as far as it may', async () => {
		const { response, sink, end, stops } = openGuarded();
		fill(sink, MAX_QUEUED_BYTES - CHANGE_BYTES);
		await turn();
		expect(stops()).toBe(0);
		expect(await response.body?.getReader().read()).toMatchObject({ done: false });
		end();
	});

	it('cuts a reader that does not read, and lets go of everything', async () => {
		const { response, sink, stops, drops } = openGuarded();
		const before = cutReaders();
		fill(sink, MAX_QUEUED_BYTES + 2 * CHANGE_BYTES);
		await turn();
		expect([stops(), drops(), cutReaders() - before]).toEqual([1, 1, 1]);
		expect(sink.send(change(1))).toBe(false);
		// What was queued is gone too: a cut reader gets no half of it, and no end that looks like a good one.
		await expect(response.body?.getReader().read()).rejects.toThrow('too slow');
	});

	it('cuts a reader that takes nothing while somebody waits for room', async () => {
		vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout'] });
		const { response, sink, drops } = openGuarded();
		fill(sink, ROOM_BYTES + 2 * CHANGE_BYTES);
		const room = sink.room();
		await turn();
		await vi.advanceTimersByTimeAsync(STALLED_MS - 1);
		expect(drops()).toBe(0);
		// One block is a sign of life: the time starts anew.
		await response.body?.getReader().read();
		await vi.advanceTimersByTimeAsync(1 + STALLED_MS - 1);
		expect(drops()).toBe(0);
		await vi.advanceTimersByTimeAsync(1);
		expect([drops(), await room]).toEqual([1, false]);
	});

	it('has room again when the reader has read, and at once while little waits', async () => {
		const { response, sink, end, drops } = openGuarded();
		fill(sink, ROOM_BYTES - CHANGE_BYTES);
		expect(await sink.room()).toBe(true);
		fill(sink, ROOM_BYTES);
		const room = sink.room();
		const reader = response.body?.getReader();
		for (let n = 0; n <= ROOM_BYTES / CHANGE_BYTES; n += 1) {
			await reader?.read();
		}
		expect(await room).toBe(true);
		expect(drops()).toBe(0);
		end();
	});

	it('takes the connection from who does not read the end in time', async () => {
		vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout'] });
		const { sink, drops } = openGuarded();
		fill(sink, ROOM_BYTES);
		sink.end();
		await turn();
		await vi.advanceTimersByTimeAsync(ENDING_MS - 1);
		expect(drops()).toBe(0);
		await vi.advanceTimersByTimeAsync(1);
		expect(drops()).toBe(1);
	});

	it('stops once when the client goes away, and leaves its connection alone', async () => {
		vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout'] });
		const { response, stops, drops } = openGuarded();
		await response.body?.cancel();
		await eventually(() => stops() > 0);
		await vi.advanceTimersByTimeAsync(2 * ENDING_MS);
		expect([stops(), drops()]).toEqual([1, 0]);
	});

	it('survives a start that throws', async () => {
		const response = guardedStream(
			() => {
				throw new Error('no start');
			},
			() => Promise.resolve(true)
		);
		const text = await readUntil(response, /never/);
		expect(text).toBe('retry: 1000\n\n');
	});
});

describe('the log', () => {
	const happened = (at: number) =>
		transact((tx) =>
			appendLive(tx, at, [{ topic: 'episode', kind: 'admitted', id: 'e', episodeId: hospital.episodeId }])
		);

	it('can be resumed from what it keeps, not from what it forgot or never gave', async () => {
		const [first] = await happened(0);
		const [second] = await happened(LIVE_HISTORY_MS + 1);
		const cursor = first?.cursor ?? 0;
		expect(await canResume(db(), cursor - 1)).toBe(true);
		await forgetOldEvents(db(), LIVE_HISTORY_MS + 1);
		expect(await canResume(db(), cursor - 1)).toBe(false);
		expect(await canResume(db(), cursor)).toBe(true);
		expect(await canResume(db(), (second?.cursor ?? 0) + 1)).toBe(false);
	});

	it('keeps its cursor when everything in it was forgotten', async () => {
		const before = await currentCursor(db());
		await db().delete(liveEvents);
		expect(await currentCursor(db())).toBe(before);
		expect(await canResume(db(), before)).toBe(true);
	});

	it('replays first and loses nothing that happens meanwhile', async () => {
		const from = await currentCursor(db());
		await happened(1);
		await happened(2);
		const response = openStream({ person: hospital.people.nurse, stillGood, after: from });
		publish(await happened(3));
		publish(await happened(4));
		const text = await readUntil(response, new RegExp(`id: ${from + 4}\nevent`));
		const ids = [...text.matchAll(/id: (\d+)\nevent: change/g)].map((match) => Number(match[1]));
		expect(ids).toEqual([from + 1, from + 2, from + 3, from + 4]);
		await response.body?.cancel();
	});

	it('replays more than may pile up at the reader’s pace, whole and in order, and what happens meanwhile', async () => {
		const many = 6_000;
		const from = await currentCursor(db());
		await db().run(sql`
			with recursive n(i) as (select 1 union all select i + 1 from n where i < ${many})
			insert into live_events (at, topic, kind, subject_id, episode_id, unit_id)
			select 1, 'episode', 'admitted', ${hospital.episodeId}, ${hospital.episodeId}, ${hospital.units.ward} from n`);
		const before = cutReaders();
		const response = openStream({ person: hospital.people.nurse, stillGood, after: from, beats: true });
		const start = await readUntil(response, new RegExp(`id: ${from + 1_000}\n`));
		publish(await happened(2));
		const text = start + (await readUntil(response, new RegExp(`id: ${from + many + 1}\nevent`)));
		const ids = [...text.matchAll(/id: (\d+)\nevent: change/g)].map((match) => Number(match[1]));
		expect(text.length).toBeGreaterThan(4 * MAX_QUEUED_BYTES);
		expect(ids).toEqual(Array.from({ length: many + 1 }, (_, n) => from + 1 + n));
		expect(cutReaders() - before).toBe(0);
		await response.body?.cancel();
	});
});

describe('a listener that throws', () => {
	it('is dropped, counted and told of, and the others hear on', async () => {
		const before = droppedListeners();
		const heard: string[] = [];
		const stops = [
			listen(
				() => {
					throw new Error('a bug');
				},
				() => heard.push('dropped')
			),
			listen((event) => heard.push(event.id))
		];
		const events = await transact((tx) =>
			appendLive(tx, 1, [{ topic: 'episode', kind: 'admitted', id: 'e', episodeId: null }])
		);
		publish(events);
		publish(events);
		stops.forEach((stop) => stop());
		expect(heard).toEqual(['dropped', 'e', 'e']);
		expect(droppedListeners() - before).toBe(1);
	});
});

describe('mayHear', () => {
	const event = (topic: 'escalation' | 'thread', unitId: string | null, userId?: string) => ({
		topic,
		kind: 'x',
		id: 'x',
		episodeId: 'e',
		cursor: 1,
		unitId,
		...(userId && { userId })
	});
	it.each([
		['a nurse of the unit', 'nurse', 'escalation', true],
		['a coordinator hears no escalation', 'coordinator', 'escalation', false],
		['a coordinator hears of threads', 'coordinator', 'thread', true],
		['an administrator sees no patients', 'admin', 'thread', false]
	] as const)('%s', (_, role, topic, heard) => {
		expect(mayHear(hospital.people[role], event(topic, hospital.units.ward))).toBe(heard);
	});

	it('keeps other units and other people’s matters away', () => {
		expect(mayHear(hospital.outsider, event('thread', hospital.units.ward))).toBe(false);
		expect(mayHear(hospital.people.nurse, event('thread', null))).toBe(false);
		expect(mayHear(hospital.people.nurse, event('thread', hospital.units.ward, 'somebody'))).toBe(false);
		expect(mayHear(hospital.people.admin, event('thread', null, hospital.people.admin.id))).toBe(true);
	});
});
