import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { recordSession } from '$lib/server/bedside/actions';
import { db } from '$lib/server/db';
import { episodes, escalations, operations } from '$lib/server/db/schema';
import { arriveAtEscalation } from '$lib/server/escalations/arrive';
import { settleEscalation } from '$lib/server/escalations/end';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { newId } from '$lib/server/ids';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, addReferral, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { iso, sessionAt, sessionBody } from '../support/session';

const hospital = await openHospital();
let episodeId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const MINUTE = 60_000;
const as = (role: keyof Hospital['people'], ms = 0) => contextOf(hospital.people[role], hospital.now + ms);
const record = (more: Partial<SessionBody> = {}, ms = 0) =>
	recordSession(as('therapist', ms), episodeId, sessionBody(more));

async function episode() {
	const [row] = await db().select().from(episodes).where(eq(episodes.id, episodeId));
	return row;
}

describe('a bedside session', () => {
	const FALLEN = { after: { hr: 86, sbp: 108, dbp: 66, spo2: 95 } };

	it('is judged and stored with its findings, and told in the thread', async () => {
		const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		const { result } = await record(FALLEN);
		expect(result.outcome).toBe('stop');
		expect(result.findings).toContainEqual(
			expect.objectContaining({ rule: 'systolic-fall', grade: 'stop', measured: 20, limit: 10 })
		);
		const thread = await getThread(db(), hospital.people.nurse, threadId, { limit: 200, after: null });
		expect(thread.items.at(-1)).toMatchObject({ kind: 'session', ref: { kind: 'session', id: result.id } });
		expect(thread.items.at(-1)?.body).toContain('128/74');
	});

	it('is judged by the limits on record, whatever the client sends', async () => {
		const body = sessionBody(FALLEN);
		body.context.limits = { 'systolic-fall': 40 };
		const { result } = await record(body);
		expect(result.findings).toContainEqual(expect.objectContaining({ rule: 'systolic-fall', limit: 10 }));
	});

	// A phone's clock may be ahead by five minutes: our choice, common practice, no published source.
	it.each([
		[5 * MINUTE - 1, true],
		[5 * MINUTE, true],
		[5 * MINUTE + 1, false]
	])('that begins %d ms ahead of the server: recorded %s', async (ahead, recorded) => {
		const outcome = await record(sessionAt(hospital.now + ahead, 0)).then(
			() => true,
			(error: { extra: unknown }) => {
				expect(error.extra).toMatchObject({ errors: [{ pointer: '/startedAt' }] });
				return false;
			}
		);
		expect(outcome).toBe(recorded);
	});

	it.each([
		[5 * MINUTE - 1, null],
		[5 * MINUTE, null],
		[5 * MINUTE + 1, '/endedAt']
	])('that ends %d ms ahead of the server: refused at %s', async (ahead, pointer) => {
		const endedAt = iso(hospital.now + ahead);
		const refused = await record({ endedAt }).then(
			() => null,
			(error: { extra: { errors: { pointer: string; message: string }[] } }) => error.extra.errors[0]
		);
		expect(refused?.pointer ?? null).toBe(pointer);
		expect(refused?.message ?? endedAt).toContain(endedAt);
	});
});

describe('a re-check that is owed', () => {
	const SETTLED = -40 * MINUTE;

	async function settled(): Promise<string> {
		const facts = { situation: 'Pressure fell.', background: '-', assessment: '-', request: 'Come.' };
		const raised = await raiseEscalation(as('therapist', -60 * MINUTE), episodeId, {
			grade: 'high',
			...facts
		});
		const { id } = raised.result;
		await takeEscalation(as('nurse', -58 * MINUTE), id, null);
		await arriveAtEscalation(as('nurse', -55 * MINUTE), id);
		await settleEscalation(as('nurse', SETTLED), id, {
			outcome: 'Rest',
			note: '122/70.',
			recheckMinutes: 15
		});
		return id;
	}

	async function owed() {
		const { mine } = await looseEndsOf(db(), hospital.people.nurse, hospital.now);
		return mine.filter((end) => end.kind === 'recheck' && end.episodeId === episodeId).length;
	}

	it.each([
		['just before it was settled', -1, 1],
		['at the moment it was settled', 0, 1],
		['just after it was settled', 1, 0]
	])('by a session begun %s', async (_, ms, left) => {
		await settled();
		await record(sessionAt(hospital.now + SETTLED + ms));
		expect(await owed()).toBe(left);
	});

	it.each<[string, Partial<SessionBody>, number]>([
		['a pulse alone', { before: {}, after: { hr: 80 } }, 0],
		['a pressure in effort alone', { before: {}, during: [{ sbp: 120, dbp: 70 }], after: {} }, 0],
		['nothing measured', { before: {}, after: {} }, 1],
		['saturation alone', { before: { spo2: 96 }, after: { spo2: 96 } }, 1]
	])('by a later session with %s', async (_, readings, left) => {
		await settled();
		await record(readings);
		expect(await owed()).toBe(left);
	});

	it('is done when the session was recorded, and a second one leaves that alone', async () => {
		const id = await settled();
		await record();
		await record(sessionAt(hospital.now - 10 * MINUTE, 5), 5 * MINUTE);
		const [row] = await db().select().from(escalations).where(eq(escalations.id, id));
		expect(row?.recheckDoneAt).toBe(hospital.now);
	});

	it('of another patient stays owed', async () => {
		await settled();
		const other = await addPatient({ unitId: hospital.units.ward });
		await recordSession(as('therapist'), other.episodeId, sessionBody());
		expect(await owed()).toBe(1);
	});
});

describe('what a session says of the patient', () => {
	const WALK: Partial<SessionBody> = { level: 3, activities: [{ code: 'room-walk', assistance: 'one' }] };
	const JUMP: Partial<SessionBody> = { level: 4, activities: [{ code: 'hall-walk', assistance: 'one' }] };
	const recordedBy = (role: keyof Hospital['people'], more: Partial<SessionBody>) =>
		recordSession(as(role), episodeId, sessionBody(more));

	it('raises the level by one when something of it was done and went well', async () => {
		await record(WALK);
		expect(await episode()).toMatchObject({ level: 3, levelReached: 3 });
	});

	it.each([
		['two levels at once', 'therapist', JUMP, 4],
		['by a nurse, who does not decide on levels', 'nurse', WALK, 3],
		['by a speech therapist, who does not either', 'speech-therapist', WALK, 3]
	] as const)('shows as reached and leaves today’s level: %s', async (_, role, more, levelReached) => {
		await recordedBy(role, more);
		expect(await episode()).toMatchObject({ level: 2, levelReached });
	});

	it('leaves today’s level after a caution to a senior', async () => {
		const cautious = { ...WALK, symptoms: ['nausea' as const] };
		await record(cautious);
		expect(await episode()).toMatchObject({ level: 2, levelReached: 3 });
		await recordedBy('physician', cautious);
		expect(await episode()).toMatchObject({ level: 3, levelReached: 3 });
	});

	it.each<[string, Partial<SessionBody>]>([
		['it was stopped', { ...WALK, after: { hr: 86, sbp: 108, dbp: 66 } }],
		['it could not be judged', { ...WALK, after: {} }],
		['nothing of it was done', { level: 3, activities: [{ code: 'chair-sitting' }] }],
		['it was planned and not done', { level: 3, activities: [{ code: 'room-walk', notDone: true }] }]
	])('leaves the level where it is when %s', async (_, more) => {
		await record(more);
		expect((await episode())?.level).toBe(2);
	});

	const heart = (rhythm: 'sinus' | 'atrial-fibrillation', betaBlocked: boolean | null) => ({
		context: { ...sessionBody().context, rhythm, betaBlocked }
	});

	it.each([
		['just before the newest', -1, 'sinus', true],
		['at the same moment as the newest, written later', 0, 'atrial-fibrillation', false],
		['just after the newest', 1, 'atrial-fibrillation', false]
	] as const)('takes rhythm and drug from a session begun %s', async (_, ms, rhythm, betaBlocked) => {
		const newest = hospital.now - 60 * MINUTE;
		await record({ ...sessionAt(newest), ...heart('sinus', true) });
		await record({ ...sessionAt(newest + ms), ...heart('atrial-fibrillation', false) });
		expect(await episode()).toMatchObject({ rhythm, betaBlocked });
	});

	it('knows no more than the newest session: not known takes the place of an older answer', async () => {
		await record(heart('atrial-fibrillation', null));
		expect(await episode()).toMatchObject({ rhythm: 'atrial-fibrillation', betaBlocked: null });
	});

	it('keeps the rhythm that was found before effort, and bars the start by it', async () => {
		const body = {
			...heart('sinus', true),
			before: { hr: 110, sbp: 128, dbp: 74, rhythm: 'atrial-fibrillation' as const }
		};
		const { result } = await record(body);
		expect(result.findings).toContainEqual(
			expect.objectContaining({ rule: 'new-rhythm', reading: 'before' })
		);
		expect(await episode()).toMatchObject({ rhythm: 'atrial-fibrillation' });
	});

	it.each([
		['before a return to theatre says nothing of now', -1, 2, true],
		['at the return to theatre counts', 0, 3, false],
		['after it counts', 1, 3, false]
	] as const)('%s', async (_, ms, level, betaBlocked) => {
		const returned = hospital.now - 60 * MINUTE;
		await db().insert(operations).values({
			id: newId(),
			episodeId,
			procedure: 'Re-opening for bleeding',
			approach: 'sternotomy',
			operatedAt: returned,
			createdAt: returned
		});
		await record({ ...WALK, ...sessionAt(returned + ms), ...heart('sinus', false) });
		expect(await episode()).toMatchObject({ level, betaBlocked });
	});
});
