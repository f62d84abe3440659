import { setImmediate as turn } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { db, transact } from '$lib/server/db';
import { liveEvents } from '$lib/server/db/schema';
import { guardedStream, MAX_QUEUED_BYTES, type Sink } from '$lib/server/live/guarded';
import { publish } from '$lib/server/live/hub';
import { appendLive, canResume, currentCursor, forgetOldEvents, LIVE_HISTORY_MS } from '$lib/server/live/log';
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
	const response = guardedStream(
		(given) => {
			sink = given;
			return () => (stopped += 1);
		},
		() => Promise.resolve(true),
		options
	);
	const send = (frame: ReturnType<typeof change>) => (sink as Sink | null)?.send(frame);
	return { response, send, stops: () => stopped, end: () => (sink as Sink | null)?.end() };
}

async function readUntil(response: Response, wanted: RegExp): Promise<string> {
	const reader = response.body?.getReader();
	const decoder = new TextDecoder();
	let text = '';
	while (!wanted.test(text)) {
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
		const { response, send, stops } = openGuarded();
		const bytes = JSON.stringify(change(1)).length;
		for (let n = 0; n < (2 * MAX_QUEUED_BYTES) / bytes; n += 1) {
			send(change(n));
		}
		await eventually(() => stops() === 1);
		expect(send(change(1))).toBe(false);
		// What was queued is gone too: a cut reader gets no half of it.
		const reader = response.body?.getReader();
		expect(await reader?.read()).toMatchObject({ done: true });
	});

	it('stops once when the client goes away', async () => {
		const { response, stops } = openGuarded();
		await response.body?.cancel();
		await eventually(() => stops() > 0);
		expect(stops()).toBe(1);
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
		const response = openStream(hospital.people.nurse, () => Promise.resolve(true), from);
		publish(await happened(3));
		publish(await happened(4));
		const text = await readUntil(response, new RegExp(`id: ${from + 4}\nevent`));
		const ids = [...text.matchAll(/id: (\d+)\nevent: change/g)].map((match) => Number(match[1]));
		expect(ids).toEqual([from + 1, from + 2, from + 3, from + 4]);
		await response.body?.cancel();
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
