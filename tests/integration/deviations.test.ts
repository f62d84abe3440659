import { beforeEach, describe, expect, it } from 'vitest';
import type { ClearanceState } from '$lib/domain/core/codes';
import { recordSession } from '$lib/server/bedside/actions';
import { acknowledgeDeviation } from '$lib/server/bedside/deviations';
import {
	askClearance,
	giveClearance,
	holdClearance,
	withdrawClearance,
	withholdClearance
} from '$lib/server/clearances/actions';
import { db } from '$lib/server/db';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, addReferral, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { ARMS, sessionAt, sessionBody } from '../support/session';

const hospital = await openHospital();
let episodeId: string;
let threadId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	({ threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id }));
});

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const deviation = { reason: 'Told by telephone.', verbalFrom: 'H. Castellane', readBack: true };

/** The history of the clearance, in hours before now: asked, given, withdrawn. */
const [ASKED, GIVEN, WITHDRAWN] = [-6 * HOUR, -5 * HOUR, -2 * HOUR];

const as = (role: keyof Hospital['people'], ms = 0) => contextOf(hospital.people[role], hospital.now + ms);
const arms = (startedAt: number, minutes = 20) =>
	sessionBody({ ...ARMS, ...sessionAt(hospital.now + startedAt, minutes) });

async function asked(ms = ASKED): Promise<string> {
	const ask = { kind: 'arm-stage', question: 'May it start?' } as const;
	return (await askClearance(as('therapist', ms), episodeId, ask)).result.id;
}

async function withdrawnAfterwards(): Promise<void> {
	const id = await asked();
	await giveClearance(as('surgeon', GIVEN), id, { limits: { maxElevationDeg: 90 } });
	await withdrawClearance(as('surgeon', WITHDRAWN), id, 'Click felt.');
}

const needed = (body: ReturnType<typeof arms>) =>
	recordSession(as('therapist'), episodeId, body).then(
		() => null,
		(error: { code: string; status: number; extra: { needed: string[] } }) => error
	);

describe('arm exercise', () => {
	it('needs the arm stage on record, whatever the client believes', async () => {
		const body = arms(-30 * MINUTE);
		body.context.clearances = ['arm-stage'];
		expect(await needed(body)).toMatchObject({
			code: 'clearance-needed',
			status: 409,
			extra: { needed: ['arm-stage'] }
		});
	});

	it.each([
		['over just before it was given', GIVEN - 20 * MINUTE - 1, true],
		['over at the moment it was given', GIVEN - 20 * MINUTE, false],
		['begun when it was given', GIVEN, false],
		['begun just before it was withdrawn', WITHDRAWN - 1, false],
		['begun when it was withdrawn', WITHDRAWN, true],
		['begun just after it was withdrawn', WITHDRAWN + 1, true]
	])('%s', async (_, startedAt, refused) => {
		await withdrawnAfterwards();
		expect((await needed(arms(startedAt))) !== null).toBe(refused);
	});

	it('is held to the limit that was in force then', async () => {
		const id = await asked();
		await giveClearance(as('surgeon', GIVEN), id, { limits: { maxElevationDeg: 60 } });
		await giveClearance(
			as('surgeon', WITHDRAWN),
			id,
			{ limits: { maxElevationDeg: 120 } },
			{ decidedAt: new Date(hospital.now + GIVEN).toISOString() }
		);
		const rules = async (startedAt: number) => {
			const { result } = await recordSession(as('therapist'), episodeId, arms(startedAt));
			return result.findings.filter(({ rule }) => rule === 'arm-elevation').map(({ limit }) => limit);
		};
		expect(await rules(WITHDRAWN - 1)).toEqual([60]);
		expect(await rules(WITHDRAWN)).toEqual([]);
	});

	it.each([
		['on the review date', '2026-03-02', false],
		['the day after it', '2026-03-01', true]
	])('late in the evening of 2 March, %s', async (_, reviewOn, refused) => {
		// 23:30 in Dublin, without daylight saving; entered the next morning.
		const evening = Date.parse('2026-03-02T23:30:00Z') - hospital.now;
		const id = await asked(-50 * HOUR);
		await giveClearance(as('surgeon', -49 * HOUR), id, { reviewOn });
		expect((await needed(arms(evening, 15))) !== null).toBe(refused);
	});
});

describe('what was done without its clearance', () => {
	const SEEN_AS: [string, ClearanceState | null, (id: string) => Promise<unknown>][] = [
		['asked and not decided', 'asked', async () => {}],
		['withheld', 'withheld', (id) => withholdClearance(as('surgeon', GIVEN), id, 'Wound is wet.')],
		[
			'on hold',
			'on-hold',
			async (id) => {
				await giveClearance(as('surgeon', GIVEN), id, {});
				await holdClearance(as('surgeon', WITHDRAWN), id, 'Fell.');
			}
		],
		[
			'withdrawn',
			'withdrawn',
			async (id) => {
				await giveClearance(as('surgeon', GIVEN), id, {});
				await withdrawClearance(as('surgeon', WITHDRAWN), id, 'Click felt.');
			}
		],
		['lapsed', 'lapsed', (id) => giveClearance(as('surgeon', -29 * HOUR), id, { reviewOn: '2026-03-02' })]
	];

	const endsOf = async (role: keyof Hospital['people'], side: 'mine' | 'theirs' = 'mine') =>
		(await looseEndsOf(db(), hospital.people[role], hospital.now))[side].filter(
			(end) => end.episodeId === episodeId && end.kind === 'deviation'
		);
	const done = () => recordSession(as('therapist'), episodeId, { ...arms(-30 * MINUTE), deviation });

	it.each(SEEN_AS)('while it was %s is told to the decider, with how it stood', async (_, stood, before) => {
		await before(await asked(stood === 'lapsed' ? -30 * HOUR : ASKED));
		const { result } = await done();
		expect(result.findings).toContainEqual(
			expect.objectContaining({ rule: 'clearance-missing', grade: 'stop' })
		);
		expect(await endsOf('surgeon')).toMatchObject([
			{ code: 'arm-stage', askedBy: hospital.people.therapist.name }
		]);
		const board = await getNameboard(db(), hospital.people.surgeon, episodeId, hospital.now);
		expect(board.deviations).toMatchObject([{ kind: 'arm-stage', stood, reason: deviation.reason }]);
	});

	it('when nobody had asked is told as well, and asks for nothing by itself', async () => {
		await done();
		expect(await endsOf('surgeon')).toHaveLength(1);
		const board = await getNameboard(db(), hospital.people.surgeon, episodeId, hospital.now);
		expect(board.deviations).toMatchObject([{ stood: null }]);
		expect(board.clearances).toEqual([]);
	});

	it('stands in the thread with the clearance and how it stood', async () => {
		const id = await asked();
		await giveClearance(as('surgeon', GIVEN), id, {});
		await holdClearance(as('surgeon', WITHDRAWN), id, 'Fell.');
		await done();
		const thread = await getThread(db(), hospital.people.nurse, threadId, { limit: 200, after: null });
		expect(thread.items.at(-1)?.body).toContain('(Arm stage: on hold): Told by telephone.');
	});

	it('waits on those who decide its kind, and whoever did it waits for them', async () => {
		await done();
		expect(await endsOf('physician')).toEqual([]);
		expect(await endsOf('nurse')).toEqual([]);
		expect(await endsOf('therapist', 'theirs')).toHaveLength(1);
	});

	it('is settled by the decider who has seen it, once, and the thread says so', async () => {
		await done();
		const [end] = await endsOf('surgeon');
		const id = end?.id ?? '';
		await acknowledgeDeviation(as('surgeon', MINUTE), id);
		expect(await endsOf('surgeon')).toEqual([]);
		const thread = await getThread(db(), hospital.people.nurse, threadId, { limit: 200, after: null });
		expect(thread.items.at(-1)).toMatchObject({ kind: 'event', author: { role: 'surgeon' } });
		await expect(acknowledgeDeviation(as('surgeon', 2 * MINUTE), id)).rejects.toMatchObject({
			code: 'wrong-state',
			extra: { seenBy: hospital.people.surgeon.name, seenAt: '2026-03-03T09:01:00.000Z' }
		});
	});

	it.each(['physician', 'nurse', 'therapist', 'coordinator'] as const)(
		'is not settled by a %s',
		async (role) => {
			await done();
			const [end] = await endsOf('surgeon');
			await expect(acknowledgeDeviation(as(role), end?.id ?? '')).rejects.toMatchObject({
				code: 'not-allowed'
			});
		}
	);

	it('is not there for a surgeon of another unit', async () => {
		await done();
		const [end] = await endsOf('surgeon');
		const outside = acknowledgeDeviation(contextOf(hospital.outsider), end?.id ?? '');
		await expect(outside).rejects.toMatchObject({ code: 'not-found' });
	});

	it('is not settled by whoever did it, though they decide the kind', async () => {
		const stairs = sessionBody({
			level: 6,
			activities: [{ code: 'stairs', helper: true }],
			deviation
		});
		await recordSession(as('physician'), episodeId, stairs);
		const [end] = await endsOf('surgeon');
		await expect(acknowledgeDeviation(as('physician'), end?.id ?? '')).rejects.toMatchObject({
			code: 'not-allowed'
		});
		expect((await acknowledgeDeviation(as('surgeon'), end?.id ?? '')).result.id).toBe(end?.id);
	});
});
