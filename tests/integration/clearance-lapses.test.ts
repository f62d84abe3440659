import { and, asc, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { askClearance, giveClearance, holdClearance } from '$lib/server/clearances/actions';
import { lapseJob } from '$lib/server/clearances/lapse';
import { getClearance } from '$lib/server/clearances/queries';
import { db } from '$lib/server/db';
import { audit, clearanceMoves, clearances, entries, liveEvents, operations } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { newId } from '$lib/server/ids';
import { addPatient, addReferral, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;
let threadId: string;
let id: string;

/** The hospital's midnights around the last day, 4 March 2026; Dublin keeps UTC in March. */
const LAST_MS = Date.parse('2026-03-04T23:59:59.999Z');
const PAST_MS = LAST_MS + 1;

beforeEach(async () => {
	// What an earlier test left behind is out of the way.
	await lapseJob.run(PAST_MS);
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	({ threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id }));
	id = await asked();
	await giveClearance(as('surgeon'), id, { reviewOn: '2026-03-04' });
});

const as = (role: keyof Hospital['people'], now = hospital.now) => contextOf(hospital.people[role], now);
const shown = (now: number) => getClearance(db(), hospital.people.nurse, id, now);
const board = (now: number) => getNameboard(db(), hospital.people.nurse, episodeId, now);

async function asked(now = hospital.now): Promise<string> {
	const ask = { kind: 'out-of-bed', question: 'May he sit out?' } as const;
	return (await askClearance(as('therapist', now), episodeId, ask)).result.id;
}

async function rowOf(clearanceId: string) {
	const [row] = await db().select().from(clearances).where(eq(clearances.id, clearanceId));
	return row;
}

const auditOf = (clearanceId: string) =>
	db()
		.select()
		.from(audit)
		.where(and(eq(audit.objectId, clearanceId), eq(audit.action, 'clearance.lapsed')));
const eventsOf = (clearanceId: string) =>
	db()
		.select({ kind: liveEvents.kind })
		.from(liveEvents)
		.where(and(eq(liveEvents.subjectId, clearanceId), eq(liveEvents.kind, 'lapsed')));
const saidOf = (clearanceId: string) =>
	db()
		.select()
		.from(entries)
		.where(and(eq(entries.threadId, threadId), eq(entries.refId, clearanceId), eq(entries.kind, 'event')))
		.orderBy(asc(entries.seq));

describe('a clearance at the end of its last day', () => {
	it('stands until midnight of the hospital', async () => {
		expect(await lapseJob.run(LAST_MS)).toBe(0);
		expect(await shown(LAST_MS)).toMatchObject({ state: 'given' });
		expect(await auditOf(id)).toEqual([]);
	});

	it('is read as lapsed from midnight on, before any job has run', async () => {
		expect((await rowOf(id))?.state).toBe('given');
		expect(await shown(PAST_MS)).toMatchObject({ state: 'lapsed' });
		const { clearances: lines, mayDoNow } = await board(PAST_MS);
		expect(lines).toMatchObject([{ id, state: 'lapsed' }]);
		expect(mayDoNow?.chair).toBe('not');
	});

	it('lapses with history, audit, entry and live event, once', async () => {
		expect(await lapseJob.run(PAST_MS)).toBe(1);
		expect(await lapseJob.run(PAST_MS)).toBe(0);
		expect((await rowOf(id))?.state).toBe('lapsed');
		expect(await auditOf(id)).toMatchObject([
			{
				actorKind: 'system',
				actorId: 'lapses',
				episodeId,
				at: PAST_MS,
				detail: { kind: 'out-of-bed', from: 'given', cause: 'end' }
			}
		]);
		expect(await eventsOf(id)).toHaveLength(1);
		expect(await saidOf(id)).toMatchObject([
			{
				authorId: null,
				strand: 'medical',
				body: 'Out of bed: Not cleared, lapsed. Its review was due 2026-03-04.'
			}
		]);
		const moves = await db().select().from(clearanceMoves).where(eq(clearanceMoves.clearanceId, id));
		expect(moves.at(-1)).toMatchObject({ fromState: 'given', toState: 'lapsed', byId: null, at: PAST_MS });
	});

	it('lapses also on hold, and leaves what has no last day', async () => {
		await holdClearance(as('surgeon'), id, 'Fell yesterday.');
		const other = await addPatient({ unitId: hospital.units.ward });
		const ask = { kind: 'stairs', question: 'May she climb?' } as const;
		const open = await askClearance(as('therapist'), other.episodeId, ask);
		await giveClearance(as('surgeon'), open.result.id, {});
		expect(await lapseJob.run(PAST_MS)).toBe(1);
		expect((await rowOf(id))?.state).toBe('lapsed');
		expect((await rowOf(open.result.id))?.state).toBe('given');
	});

	it('cannot be decided any more, whether or not the job has run', async () => {
		const again = () => giveClearance(as('surgeon', PAST_MS), id, { reviewOn: '2026-03-09' });
		const refused = { code: 'wrong-state', status: 409, extra: { state: 'lapsed' } };
		await expect(again()).rejects.toMatchObject(refused);
		await lapseJob.run(PAST_MS);
		await expect(again()).rejects.toMatchObject(refused);
	});
});

describe('asking again', () => {
	it('after the end lapses the old one in the same transaction, on record', async () => {
		const second = await asked(PAST_MS);
		expect((await rowOf(id))?.state).toBe('lapsed');
		expect(await auditOf(id)).toMatchObject([{ actorKind: 'person', detail: { cause: 'end' } }]);
		expect(await eventsOf(id)).toHaveLength(1);
		expect(await saidOf(id)).toHaveLength(1);
		expect((await rowOf(second))?.state).toBe('asked');
	});

	it('after a later operation lapses the one before it and says why', async () => {
		await db().insert(operations).values({
			id: newId(),
			episodeId,
			procedure: 'Re-opening for bleeding',
			approach: 'sternotomy',
			operatedAt: hospital.now,
			createdAt: hospital.now
		});
		await asked(hospital.now + 1000);
		expect(await auditOf(id)).toMatchObject([{ detail: { cause: 'earlier-operation' } }]);
		expect(await saidOf(id)).toMatchObject([{ body: 'Out of bed: Not cleared, lapsed.' }]);
	});
});
