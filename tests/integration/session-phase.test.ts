import { desc, eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { recordSession } from '$lib/server/bedside/actions';
import { db } from '$lib/server/db';
import { bedsideSessions, episodes, placements, signOffs } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { wordActivity } from '$lib/server/limits/activity-actions';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, addPerson, addReferral, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { sessionAt, sessionBody } from '../support/session';

const hospital = await openHospital();
const HOUR = 60 * 60_000;
/** When the patient left the ward for the gym. */
const MOVED = hospital.now - 2 * HOUR;
let episodeId: string;
let threadId: string;

beforeEach(async () => {
	const { ward, gym } = hospital.units;
	({ episodeId } = await addPatient({ unitId: gym }));
	({ threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id }));
	await db().update(episodes).set({ phase: 'outpatient' }).where(eq(episodes.id, episodeId));
	await db()
		.insert(placements)
		.values([
			{ id: newId(), episodeId, unitId: ward, fromAt: MOVED - 48 * HOUR, untilAt: MOVED },
			{ id: newId(), episodeId, unitId: gym, fromAt: MOVED, untilAt: null }
		]);
});

/** The set and the phase that judged a session that ended then, and its line in the thread. */
async function judged(endedAt: number, said: 'inpatient' | 'outpatient' | undefined, set?: 'guideline') {
	const { context, ...body }: SessionBody = sessionBody(sessionAt(endedAt, 0));
	const input = { ...body, context: { ...context, phase: said, set } };
	await recordSession(contextOf(hospital.people.therapist, hospital.now), episodeId, input);
	const [row] = await db()
		.select()
		.from(bedsideSessions)
		.where(eq(bedsideSessions.episodeId, episodeId))
		.orderBy(desc(bedsideSessions.recordedAt), desc(bedsideSessions.id));
	const { items } = await getThread(db(), hospital.people.nurse, threadId, { limit: 50, after: null });
	return { set: row?.limitSet, phase: row?.context.phase, line: items.at(-1)?.body ?? '' };
}

describe('the phase that judges a session', () => {
	it.each([
		['just before the patient moved', MOVED - 1, 'inpatient', 'strict'],
		['at the move', MOVED, 'outpatient', 'outpatient'],
		['just after it', MOVED + 1, 'outpatient', 'outpatient']
	] as const)('is the one on record when it ended: %s', async (_, endedAt, phase, set) => {
		expect(await judged(endedAt, undefined)).toMatchObject({ phase, set });
	});

	it.each([
		[MOVED - 1, 'outpatient', 'inpatient', 'strict'],
		[MOVED, 'inpatient', 'outpatient', 'outpatient']
	] as const)('is not what the body says: ended at %d, sent as %s', async (endedAt, said, phase, set) => {
		const found = await judged(endedAt, said);
		expect(found).toMatchObject({ phase, set });
		expect(found.line).toContain(`Sent as ${said}; judged as ${phase}, as the record has it.`);
	});

	it('is not mentioned where both say the same', async () => {
		expect((await judged(MOVED, 'outpatient')).line).not.toContain('as the record has it');
	});

	it('goes with the doses of the unit it was in, also where it is entered after the patient has moved', async () => {
		const dose = { words: '30 to 40 minutes', repetitions: null, timesADay: null };
		const lines = {
			name: 'Sitting',
			needs: [],
			dose: { ...dose, minutes: [30, 40] as [number, number] },
			howTo: ['Upright.'],
			watch: ['The face.'],
			never: ['Alone.']
		};
		const agreed = { agreedBy: 'Maeve Tidewell', agreedOn: '2026-03-01' };
		const admin = contextOf(hospital.people.admin, hospital.now);
		const code = 'chair-sitting';
		// The ward's cautious figure is thirty minutes; the gym goes by the catalogue's fifteen.
		await wordActivity(admin, hospital.units.ward, { code, lines, ...agreed });
		const junior = await addPerson({ role: 'therapist', unitIds: Object.values(hospital.units) });
		const signaturesAfter = async (endedAt: number) => {
			const input = {
				...sessionBody(sessionAt(endedAt - 20 * 60_000)),
				activities: [{ code, minutes: 30 } as const]
			};
			await recordSession(contextOf(junior, hospital.now), episodeId, input);
			return (await db().select().from(signOffs).where(eq(signOffs.episodeId, episodeId))).length;
		};
		expect(await signaturesAfter(MOVED - 1)).toBe(0);
		expect(await signaturesAfter(MOVED + 60 * 60_000)).toBe(1);
	});

	it('leaves a set that the body names', async () => {
		expect(await judged(MOVED - 1, undefined, 'guideline')).toMatchObject({ set: 'guideline' });
	});
});
