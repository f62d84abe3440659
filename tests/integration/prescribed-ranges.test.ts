import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { eq } from 'drizzle-orm';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { recordSession } from '$lib/server/bedside/actions';
import { listSessions } from '$lib/server/bedside/queries';
import { db } from '$lib/server/db';
import { bedsideSessions, episodes } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { endRange, prescribeRange } from '$lib/server/limits/range-actions';
import { rangesOf } from '$lib/server/limits/ranges';
import { setPatientLimit } from '$lib/server/limits/patient-actions';
import { getThread } from '$lib/server/threads/queries';
import { freshDatabase } from '../support/database';
import {
	addPatient,
	addPerson,
	addReferral,
	contextOf,
	makeHospital,
	type Hospital
} from '../support/hospital';

const RANGE = { hrMin: 90, hrMax: 118, rpeMin: 11, rpeMax: 13, method: 'walk-test' } as const;

let close: () => void;
let hospital: Hospital;
let episodeId: string;

beforeAll(async () => {
	({ close } = await freshDatabase());
	hospital = await makeHospital();
});
beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.gym }));
	await db().update(episodes).set({ phase: 'outpatient' }).where(eq(episodes.id, episodeId));
});
afterAll(() => close());

type Who = keyof Hospital['people'];
const as = (role: Who, later = 0) => contextOf(hospital.people[role], hospital.now + later * 60_000);

/** A gym session in which the pulse reaches so much, ended so many minutes after the fixture's instant. */
function session(hr: number, later = 5, context: Partial<SessionBody['context']> = {}): SessionBody {
	const rest = { hr: 80, sbp: 120, dbp: 70, spo2: 97, rr: 14, pain: 0 };
	return {
		context: {
			betaBlocked: false,
			rhythm: 'sinus',
			sternotomy: true,
			level: 6,
			conscious: true,
			followsCommands: true,
			...context
		},
		startedAt: new Date(hospital.now + (later - 3) * 60_000).toISOString(),
		endedAt: new Date(hospital.now + later * 60_000).toISOString(),
		level: 6,
		before: rest,
		during: [{ ...rest, hr, rpe: 12 }],
		after: rest,
		symptoms: [],
		activities: []
	};
}

async function ceiling(body: SessionBody, later = 10) {
	const { result } = await recordSession(as('therapist', later), episodeId, body);
	return result.findings.find(({ rule }) => rule === 'heart-rate-ceiling') ?? null;
}

describe('a prescribed range', () => {
	it.each([
		[118, null],
		[118.5, 'stop']
	])('judges the sessions of an outpatient: a pulse of %d: %s', async (hr, grade) => {
		await prescribeRange(as('physician'), episodeId, RANGE);
		const found = await ceiling(session(hr));
		expect(found?.grade ?? null).toBe(grade);
	});

	it('is kept with each finding: set, limit, version, whose it is and how it was found', async () => {
		await prescribeRange(as('physician'), episodeId, RANGE);
		await recordSession(as('therapist', 10), episodeId, session(125));
		const [line] = await listSessions(db(), hospital.people.nurse, episodeId);
		expect(line).toMatchObject({ limitSet: 'outpatient', limitVersion: 'outpatient/2+prescribed 1' });
		expect(line?.findings.find(({ rule }) => rule === 'heart-rate-ceiling')).toMatchObject({
			grade: 'stop',
			limit: 118,
			set: 'outpatient',
			version: 'prescribed 1',
			source: `range prescribed for this patient by ${hospital.people.physician.name}, 2026-03-03 (walk-test)`
		});
		const [row] = await db().select().from(bedsideSessions).where(eq(bedsideSessions.episodeId, episodeId));
		expect(row?.context).toMatchObject({ prescribed: { hrMin: 90, hrMax: 118, rpeMin: 11, rpeMax: 13 } });
	});

	it('counts from the record, not from what the client believes in', async () => {
		await prescribeRange(as('physician'), episodeId, RANGE);
		expect(await ceiling(session(125, 5, { prescribed: { hrMax: 150 } }))).toMatchObject({ limit: 118 });
	});

	it('without one the range that the client goes by judges, and else the general ceiling', async () => {
		expect(await ceiling(session(125, 5, { prescribed: { hrMax: 110 } }))).toMatchObject({ limit: 110 });
		expect(await ceiling(session(131))).toMatchObject({ grade: 'stop', limit: 130 });
	});

	it('judges a session entered afterwards as it stood when that ended; a newer one takes its place', async () => {
		await prescribeRange(as('physician'), episodeId, RANGE);
		await prescribeRange(as('physician', 20), episodeId, { hrMax: 110, method: 'exercise-test' });
		expect(await ceiling(session(125, 5), 30)).toMatchObject({ limit: 118, version: 'prescribed 1' });
		expect(await ceiling(session(125, 25), 30)).toMatchObject({ limit: 110, version: 'prescribed 2' });
	});

	it('lies over a limit of the patient that is wider, and under one that is narrower', async () => {
		await prescribeRange(as('physician'), episodeId, RANGE);
		const own = { key: 'heart-rate-ceiling', reason: 'Flutter at 112.', untilOn: '2026-04-01' } as const;
		await setPatientLimit(as('physician', 1), episodeId, { ...own, value: 112 });
		expect(await ceiling(session(125))).toMatchObject({ limit: 112, version: 'patient 1' });
		await setPatientLimit(as('physician', 2), episodeId, { ...own, value: 160 });
		expect(await ceiling(session(125))).toMatchObject({ limit: 118, version: 'prescribed 1' });
	});

	it('is on the nameboard, is told in the thread, and stays on record when it ends', async () => {
		const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
		const senior = { ...hospital.people.therapist, senior: true };
		await prescribeRange(contextOf(senior, hospital.now), episodeId, RANGE);
		const board = await getNameboard(db(), hospital.people.nurse, episodeId, hospital.now + 1);
		expect(board.limits.prescribed).toMatchObject({ ...RANGE, version: 1 });
		await endRange(as('physician', 1), episodeId);
		await expect(endRange(as('physician', 2), episodeId)).rejects.toMatchObject({ code: 'wrong-state' });
		expect(await ceiling(session(125))).toMatchObject({ grade: 'caution', limit: 120 });
		const lines = await rangesOf(db(), hospital.people.nurse, episodeId);
		expect(lines.map(({ version, method, inForce }) => [version, method, inForce])).toEqual([
			[2, null, false],
			[1, 'walk-test', false]
		]);
		const { items } = await getThread(db(), hospital.people.nurse, threadId, { limit: 50, after: null });
		expect(items.map(({ body }) => body).slice(0, 2)).toEqual([
			'Prescribed range: pulse 90 to 118, exertion 11 to 13; six-minute walk.',
			'The prescribed range has ended; the general ceilings hold.'
		]);
	});

	it.each(['nurse', 'speech-therapist', 'coordinator', 'admin'] as const)('is not a %s’s', async (role) => {
		await expect(prescribeRange(as(role), episodeId, RANGE)).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('is not a junior’s, nor of another unit, nor of an inpatient', async () => {
		const { unitIds } = hospital.people.physician;
		const junior = await addPerson({ role: 'therapist', unitIds: [...unitIds] });
		const at = (person: typeof junior) => contextOf(person, hospital.now);
		await expect(prescribeRange(at(junior), episodeId, RANGE)).rejects.toMatchObject({ code: 'not-allowed' });
		await expect(prescribeRange(at(hospital.outsider), episodeId, RANGE)).rejects.toMatchObject({
			code: 'not-found'
		});
		await expect(prescribeRange(as('physician'), hospital.episodeId, RANGE)).rejects.toMatchObject({
			code: 'wrong-state'
		});
	});
});
