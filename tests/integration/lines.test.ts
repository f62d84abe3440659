import { and, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { recordSession } from '$lib/server/bedside/actions';
import { amendSession } from '$lib/server/bedside/amend';
import { askClearance, giveClearance } from '$lib/server/clearances/actions';
import { getClearance } from '$lib/server/clearances/queries';
import { db } from '$lib/server/db';
import { audit, lines, liveEvents } from '$lib/server/db/schema';
import { listEpisodes } from '$lib/server/episodes/list';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { noteLineIn, noteLineOut, noteOxygen } from '$lib/server/lines/actions';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, addReferral, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { iso, sessionAt, sessionBody } from '../support/session';

const hospital = await openHospital();
let episodeId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

type Role = keyof Hospital['people'];
const MINUTE = 60_000;
const NOTING = ['nurse', 'therapist', 'physician', 'surgeon'] as const;
const REFUSED = ['speech-therapist', 'coordinator', 'admin'] as const;
const DRAIN = { kind: 'chest-drain' } as const;

/** @param minutes after the hospital's now */
const as = (role: Role, minutes = 0) => contextOf(hospital.people[role], hospital.now + minutes * MINUTE);
const keyed = (role: Role, key: string) => ({
	...as(role),
	key: { key, path: '/api/episodes/lines', digest: key }
});
const at = (minutes: number) => iso(hospital.now + minutes * MINUTE);
const board = (role: Role = 'nurse') => getNameboard(db(), hospital.people[role], episodeId, hospital.now);
const onTheWard = async (role: Role = 'nurse') => {
	const all = { limit: 200, after: null };
	const { items } = await listEpisodes(db(), hospital.people[role], hospital.now, null, all);
	return items.find(({ id }) => id === episodeId);
};
const drainIn = async (minutes = 0) => (await noteLineIn(as('nurse', minutes), episodeId, DRAIN)).result.id;

describe('a line', () => {
	it.each(NOTING)('is noted in and out by a %s, by name and time', async (role) => {
		const { result } = await noteLineIn(as(role), episodeId, DRAIN);
		expect((await board()).lines).toEqual(['chest-drain']);
		await noteLineOut(as(role, 5), result.id);
		const { lines: there, lineNotes } = await board();
		expect(there).toEqual([]);
		const { name } = hospital.people[role];
		expect(lineNotes).toEqual([
			{ id: result.id, ...DRAIN, inBy: name, inAt: at(0), outBy: name, outAt: at(5) }
		]);
	});

	it.each(REFUSED)('is not noted by a %s', async (role) => {
		const id = await drainIn();
		const refused = { code: 'not-allowed' };
		await expect(noteLineIn(as(role), episodeId, { kind: 'arterial-line' })).rejects.toMatchObject(refused);
		await expect(noteLineOut(as(role), id)).rejects.toMatchObject(refused);
		await expect(noteOxygen(as(role), episodeId, { lpm: 2 })).rejects.toMatchObject(refused);
		expect(await board()).toMatchObject({ lines: ['chest-drain'], oxygen: null });
	});

	it('of a patient of another unit is not there', async () => {
		const id = await drainIn();
		const outside = contextOf(hospital.outsider);
		const missing = { code: 'not-found' };
		await expect(noteLineIn(outside, episodeId, DRAIN)).rejects.toMatchObject(missing);
		await expect(noteLineOut(outside, id)).rejects.toMatchObject(missing);
		await expect(noteLineOut(as('nurse'), 'none')).rejects.toMatchObject(missing);
		await expect(noteOxygen(outside, episodeId, { lpm: 2 })).rejects.toMatchObject(missing);
	});

	it('that is in cannot be put in again, and one that is out is not taken out again', async () => {
		const id = await drainIn();
		await expect(noteLineIn(as('therapist', 1), episodeId, DRAIN)).rejects.toMatchObject({
			code: 'wrong-state',
			detail: expect.stringMatching(new RegExp(`in already.*${hospital.people.nurse.name}.*chest drain`)),
			extra: { state: 'in' }
		});
		await noteLineOut(as('nurse', 2), id);
		await expect(noteLineOut(as('therapist', 3), id)).rejects.toMatchObject({
			code: 'wrong-state',
			detail: expect.stringMatching(new RegExp(`out already.*${hospital.people.nurse.name}.*chest drain`)),
			extra: { state: 'out' }
		});
	});

	it('put in again later is another one, and the first stays on record', async () => {
		const first = await drainIn();
		await noteLineOut(as('nurse', 10), first);
		const second = await drainIn(20);
		const { lines: there, lineNotes } = await board();
		expect(there).toEqual(['chest-drain']);
		expect(lineNotes.map(({ id, outAt }) => [id, outAt])).toEqual([
			[second, null],
			[first, at(10)]
		]);
	});

	it('is noted once where one key comes twice, in and out', async () => {
		const one = await noteLineIn(keyed('nurse', `in-${episodeId}`), episodeId, DRAIN);
		const again = await noteLineIn(keyed('nurse', `in-${episodeId}`), episodeId, DRAIN);
		expect(again).toEqual({ ...one, replayed: true });
		const { id } = one.result;
		await noteLineOut(keyed('nurse', `out-${id}`), id);
		expect(await noteLineOut(keyed('nurse', `out-${id}`), id)).toEqual({ result: { id }, replayed: true });
		expect((await board()).lineNotes).toHaveLength(1);
	});

	it('is on record, told in the thread of whoever noted it, and heard on open pages', async () => {
		const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		const id = await drainIn();
		await noteLineOut(as('nurse', 1), id);
		await noteOxygen(as('nurse', 2), episodeId, { lpm: 2 });
		const ofEpisode = eq(audit.episodeId, episodeId);
		const rows = await db().select().from(audit).where(ofEpisode).orderBy(audit.seq);
		expect(rows.map(({ action }) => action)).toEqual(['line.noted-in', 'line.noted-out', 'oxygen.noted']);
		const { items } = await getThread(db(), hospital.people.surgeon, threadId, { limit: 50, after: null });
		expect(items.map(({ kind, body, ref }) => [kind, body, ref?.kind])).toEqual([
			['event', 'Noted as in: chest drain.', 'line'],
			['event', 'Noted as out: chest drain.', 'line'],
			['event', 'Noted: oxygen 2 L/min.', 'oxygen-note']
		]);
		const ofTopic = and(eq(liveEvents.episodeId, episodeId), eq(liveEvents.topic, 'episode'));
		const heard = await db().select().from(liveEvents).where(ofTopic).orderBy(liveEvents.id);
		expect(heard.map(({ kind }) => kind)).toEqual(['line-in', 'line-out', 'oxygen-noted']);
	});

	it('keeps what it says in the database itself', async () => {
		const id = await drainIn();
		const row = eq(lines.id, id);
		const cause = (message: string) => ({ cause: { message: expect.stringContaining(message) } });
		const again = { episodeId, ...DRAIN, inBy: hospital.people.nurse.id, inAt: 1 };
		await expect(
			db()
				.insert(lines)
				.values({ id: 'x', ...again })
		).rejects.toMatchObject(cause('UNIQUE'));
		for (const change of [{ kind: 'pacing-wires' as const }, { inAt: 1 }, { outAt: 1 }, { outBy: 'x' }]) {
			await expect(db().update(lines).set(change).where(row)).rejects.toMatchObject(cause('once'));
		}
		await noteLineOut(as('nurse', 1), id);
		await expect(db().update(lines).set({ outAt: 1 }).where(row)).rejects.toMatchObject(cause('once'));
		await expect(db().update(lines).set({ outAt: null }).where(row)).rejects.toMatchObject(cause('once'));
		await expect(db().delete(lines).where(row)).rejects.toMatchObject(cause('once'));
	});
});

describe('the oxygen', () => {
	const session = (startedAt: number, more: Parameters<typeof sessionBody>[0]) =>
		recordSession(as('therapist'), episodeId, sessionBody({ ...sessionAt(startedAt), ...more }));
	const quiet = { hr: 78, sbp: 128, dbp: 74 };

	it('is unknown until somebody says it, and no oxygen is said too', async () => {
		await session(hospital.now - 30 * MINUTE, {});
		expect((await board()).oxygen).toBeNull();
		await noteOxygen(as('nurse'), episodeId, { lpm: 0 });
		expect((await board()).oxygen).toEqual({ lpm: 0, at: at(0), by: hospital.people.nurse.name });
	});

	it('is that of the session, as long as nobody has noted it later', async () => {
		await noteOxygen(as('nurse', -60), episodeId, { lpm: 4 });
		await session(hospital.now - 30 * MINUTE, {
			before: { ...quiet, oxygenLpm: 3 },
			after: { ...quiet, oxygenLpm: 2 }
		});
		const by = hospital.people.therapist.name;
		expect((await board()).oxygen).toEqual({ lpm: 2, at: at(-10), by });
		await noteOxygen(as('nurse', -5), episodeId, { lpm: 1 });
		expect((await board()).oxygen).toMatchObject({ lpm: 1, at: at(-5) });
	});

	it('is not changed by a session that is entered afterwards, from before the note', async () => {
		await noteOxygen(as('nurse', -60), episodeId, { lpm: 1 });
		await session(hospital.now - 120 * MINUTE, { after: { ...quiet, oxygenLpm: 4 } });
		expect((await board()).oxygen).toMatchObject({ lpm: 1, at: at(-60) });
	});

	it.each([
		['its own instant', { during: [{ ...quiet, oxygenLpm: 3, at: at(-12) }] }, 3, -12],
		['the session’s beginning before it', { before: { ...quiet, oxygenLpm: 3 } }, 3, -30],
		[
			'the session’s beginning, the last of those during it',
			{ before: { ...quiet, oxygenLpm: 2 }, during: [1, 4].map((oxygenLpm) => ({ ...quiet, oxygenLpm })) },
			4,
			-30
		]
	])('of a reading is of %s', async (_, readings, lpm, minutes) => {
		await session(hospital.now - 30 * MINUTE, readings);
		expect((await board()).oxygen).toMatchObject({ lpm, at: at(minutes) });
	});

	it('of a session that was entered in error does not count', async () => {
		await noteOxygen(as('nurse', -60), episodeId, { lpm: 2 });
		const { result } = await session(hospital.now - 30 * MINUTE, { after: { ...quiet, oxygenLpm: 6 } });
		await amendSession(as('therapist', 1), episodeId, {
			sessionId: result.id,
			kind: 'entered-in-error',
			body: 'Another patient.'
		});
		expect((await board()).oxygen).toMatchObject({ lpm: 2 });
	});
});

describe('who reads them', () => {
	beforeEach(async () => {
		for (const kind of ['urinary-catheter', 'chest-drain', 'endotracheal-tube'] as const) {
			await noteLineIn(as('nurse'), episodeId, { kind });
		}
		await noteOxygen(as('nurse'), episodeId, { lpm: 2 });
	});

	it('sees the same on the ward and on the patient’s page, in the order of the list', async () => {
		const ordered = ['endotracheal-tube', 'chest-drain', 'urinary-catheter'];
		expect(await onTheWard()).toMatchObject({ lines: ordered, oxygen: { lpm: 2, at: at(0) } });
		expect(await board()).toMatchObject({ lines: ordered, oxygen: { lpm: 2, at: at(0) } });
		const other = await addPatient({ unitId: hospital.units.ward });
		episodeId = other.episodeId;
		expect(await onTheWard()).toMatchObject({ lines: [], oxygen: null });
	});

	it('is nobody who reads no sessions: a coordinator is shown none, the admin no patient', async () => {
		expect(await onTheWard('coordinator')).toMatchObject({ lines: [], oxygen: null });
		expect(await board('coordinator')).toMatchObject({ lines: [], lineNotes: [], oxygen: null });
		await expect(board('admin')).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('decides a clearance on them, and hears what has changed since the page was shown', async () => {
		const ask = { kind: 'corridor', question: 'May it start?' } as const;
		const { result } = await askClearance(as('therapist', 1), episodeId, ask);
		const seen = (role: Role) => getClearance(db(), hospital.people[role], result.id, hospital.now);
		const { evidence, shown } = await seen('surgeon');
		expect(evidence).toMatchObject({
			lines: ['endotracheal-tube', 'chest-drain', 'urinary-catheter'],
			oxygen: { lpm: 2, at: at(0), by: hospital.people.nurse.name }
		});
		expect((await seen('coordinator')).evidence).toMatchObject({ lines: [], oxygen: null, sessions: null });
		const tube = (await board()).lineNotes.find(({ kind }) => kind === 'endotracheal-tube');
		await noteLineOut(as('nurse', 2), tube?.id ?? '');
		await noteOxygen(as('nurse', 3), episodeId, { lpm: 6 });
		await expect(giveClearance(as('surgeon', 4), result.id, {}, { evidence: shown })).rejects.toMatchObject({
			code: 'evidence-changed',
			extra: { news: { changed: ['lines', 'oxygen'] } }
		});
	});
});
