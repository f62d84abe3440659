import { setImmediate as turn } from 'node:timers/promises';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { db, transact } from '$lib/server/db';
import { liveEvents } from '$lib/server/db/schema';
import { cutReaders, guardedStream, type Sink } from '$lib/server/live/guarded';
import { droppedListeners, listen, publish } from '$lib/server/live/hub';
import { appendLive, canResume, currentCursor, forgetOldEvents, LIVE_HISTORY_MS } from '$lib/server/live/log';
import { MAX_QUEUED_BYTES } from '$lib/server/live/pipe';
import { mayHear, openStream } from '$lib/server/live/stream';
import { freshDatabase } from '../support/database';
import { makeHospital, type Hospital } from '../support/hospital';

let close: () => void;
let hospital: Hospital;
beforeAll(async () => {
	({ close } = await freshDatabase());
	hospital = await makeHospital();
});
afterAll(() => close());

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
	let sink: Sink | null = null;
	let stopped = 0;
	let cutOff = 0;
	const response = guardedStream(
		(given) => {
			sink = given;
			return () => (stopped += 1);
		},
		stillGood,
		{ ...options, cutOff: () => (cutOff += 1) }
	);
	const send = (frame: ReturnType<typeof change>) => (sink as Sink | null)?.send(frame);
	const end = () => (sink as Sink | null)?.end();
	return { response, send, stops: () => stopped, cuts: () => cutOff, end };
}

async function readUntil(response: Response, wanted: RegExp): Promise<string> {
	const reader = response.body?.getReader();
	const decoder = new TextDecoder();
	let text = '';
	while (!wanted.test(text.slice(-2_000))) {
		// A reader that is slower than the sender, as every network is.
		await turn();
		const part = await reader?.read();
		if (!part || part.done) {
			break;
		}
		text += decoder.decode(part.value);
	}
	reader?.releaseLock();
	return text;
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

	it('cuts a reader that does not read, and lets go of everything', async () => {
		const { response, send, stops, cuts } = openGuarded();
		const before = cutReaders();
		const bytes = JSON.stringify(change(1)).length;
		for (let n = 0; n < (2 * MAX_QUEUED_BYTES) / bytes; n += 1) {
			send(change(n));
		}
		await eventually(() => stops() === 1);
		expect(send(change(1))).toBe(false);
		expect([cuts(), cutReaders() - before]).toEqual([1, 1]);
		// What was queued is gone too: a cut reader gets no half of it.
		const reader = response.body?.getReader();
		expect(await reader?.read()).toMatchObject({ done: true });
	});

	it('stops once when the client goes away', async () => {
		const { response, stops, cuts } = openGuarded();
		await response.body?.cancel();
		await eventually(() => stops() > 0);
		expect([stops(), cuts()]).toEqual([1, 0]);
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

	it('replays more than may pile up to a reader at its own pace, whole and in order', async () => {
		const from = await currentCursor(db());
		const many = 5_000;
		await transact((tx) =>
			tx.run(sql`
				with recursive n(i) as (select 1 union all select i + 1 from n where i < ${many})
				insert into live_events (at, topic, kind, subject_id, episode_id, unit_id)
				select 1, 'episode', 'admitted', 'e', ${hospital.episodeId},
				(select unit_id from episodes where id = ${hospital.episodeId}) from n`)
		);
		const response = openStream({ person: hospital.people.nurse, stillGood, after: from });
		const text = await readUntil(response, new RegExp(`id: ${from + many}\nevent`));
		expect(text.length).toBeGreaterThan(2 * MAX_QUEUED_BYTES);
		const ids = [...text.matchAll(/id: (\d+)\nevent: change/g)].map((match) => Number(match[1]));
		expect(ids).toEqual(Array.from({ length: many }, (_, n) => from + 1 + n));
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
