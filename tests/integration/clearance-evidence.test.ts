import { and, eq, ne } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { recordSession } from '$lib/server/bedside/actions';
import {
	askClearance,
	giveClearance,
	holdClearance,
	withdrawClearance,
	withholdClearance
} from '$lib/server/clearances/actions';
import type { Seen } from '$lib/server/clearances/refuse';
import { getClearance } from '$lib/server/clearances/queries';
import { db } from '$lib/server/db';
import { clearanceMoves } from '$lib/server/db/schema';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { noteWound } from '$lib/server/wounds/actions';
import { CALL } from '../support/escalations';
import { addPatient, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { sessionAt, sessionBody } from '../support/session';

const hospital = await openHospital();
let episodeId: string;
let id: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	await recordSession(as('therapist'), episodeId, sessionBody());
	const ask = { kind: 'arm-stage', question: 'May the arms start?' } as const;
	id = (await askClearance(as('therapist', 60), episodeId, ask)).result.id;
});

const as = (role: keyof Hospital['people'], seconds = 0) =>
	contextOf(hospital.people[role], hospital.now + seconds * 1000);
const shown = (seconds: number) =>
	getClearance(db(), hospital.people.surgeon, id, hospital.now + seconds * 1000);
/** A fall of 20 in the systolic pressure: API.md, rule systolic-fall, stops over 10. */
const stopped = (seconds: number, startedAt = hospital.now - 15 * 60_000) => {
	const during = [{ hr: 90, sbp: 108, dbp: 74, spo2: 96 }];
	const body = sessionBody({ during, ...sessionAt(startedAt, 10) });
	return recordSession(as('therapist', seconds), episodeId, body);
};
async function decidedOn() {
	const decided = and(eq(clearanceMoves.clearanceId, id), ne(clearanceMoves.toState, 'asked'));
	const [move] = await db().select().from(clearanceMoves).where(decided);
	return move?.evidence ?? null;
}

describe('an open ask', () => {
	it('shows a stop that was recorded after it, and says that it is new', async () => {
		expect(await shown(90)).toMatchObject({ news: null, evidence: { sessions: [{ outcome: 'clear' }] } });
		await stopped(120);
		const view = await shown(150);
		expect(view.news).toEqual({ sessions: 1, escalations: 0, changed: [] });
		expect(view.evidence.at).toBe('2026-03-03T09:02:30.000Z');
		expect(view.evidence.sessions).toMatchObject([{ outcome: 'stop' }, { outcome: 'clear' }]);
		expect(view.askedOn.sessions).toMatchObject([{ outcome: 'clear' }]);
	});

	it('shows every session since the ask, however many came after the stop or were entered late', async () => {
		await stopped(120, hospital.now - 20 * 3600_000);
		for (const minutes of [14, 13, 12]) {
			const body = sessionBody(sessionAt(hospital.now - minutes * 60_000, 1));
			await recordSession(as('therapist', 180), episodeId, body);
		}
		const { evidence, news } = await shown(200);
		expect(evidence.sessions?.map(({ outcome }) => outcome)).toContain('stop');
		expect(news?.sessions).toBe(4);
	});

	it('shows an open call for help', async () => {
		await raiseEscalation(as('therapist', 100), episodeId, CALL);
		const { evidence, news } = await shown(120);
		expect(evidence.escalations).toMatchObject([{ state: 'raised', situation: CALL.situation }]);
		expect(news?.escalations).toBe(1);
	});
});

describe('a decision', () => {
	const moves: [string, (seconds: number, seen: Seen) => Promise<unknown>][] = [
		['give', (seconds, seen) => giveClearance(as('surgeon', seconds), id, {}, seen)],
		['withhold', (seconds, seen) => withholdClearance(as('surgeon', seconds), id, 'Not today.', seen)]
	];
	it.each(moves)('to %s is refused once where something is new, then stored with it', async (_, decide) => {
		const before = await shown(90);
		const { result } = await stopped(120);
		await noteWound(as('nurse', 121), episodeId, { wound: 'moist' });
		await expect(decide(130, { evidence: before.shown })).rejects.toMatchObject({
			code: 'evidence-changed',
			status: 409,
			detail: expect.stringContaining('1 new session, wound noted'),
			extra: { news: { sessions: 1, escalations: 0, changed: ['wound'] } }
		});
		const after = await shown(140);
		expect(after.state).toBe('asked');
		await decide(150, { evidence: after.shown });
		const stored = await decidedOn();
		expect(stored).toEqual({ ...after.evidence, at: '2026-03-03T09:02:30.000Z' });
		expect(stored?.sessions[0]?.id).toBe(result.id);
	});

	it.each<[string, (seen: Seen) => Promise<unknown>]>([
		['hold', (seen) => holdClearance(as('surgeon', 300), id, 'Click felt.', seen)],
		['withdraw', (seen) => withdrawClearance(as('surgeon', 300), id, 'Click felt.', seen)]
	])('to %s what was given is refused on old evidence too', async (_, decide) => {
		await giveClearance(as('surgeon', 90), id, {});
		const { shown: evidence } = await shown(100);
		await raiseEscalation(as('therapist', 120), episodeId, CALL);
		await expect(decide({ evidence })).rejects.toMatchObject({ code: 'evidence-changed' });
		await decide({ evidence: (await shown(200)).shown });
	});

	it('by a caller who does not say what they saw goes by what is on record', async () => {
		await stopped(120);
		await giveClearance(as('surgeon', 150), id, {});
		expect((await decidedOn())?.sessions).toHaveLength(2);
	});

	it('never stands in the way of an ask that is taken back', async () => {
		const { shown: evidence } = await shown(90);
		await stopped(120);
		await withdrawClearance(as('therapist', 130), id, 'Too early.', { evidence });
		expect(await shown(140)).toMatchObject({ state: 'withdrawn', decidedOn: null });
	});
});
