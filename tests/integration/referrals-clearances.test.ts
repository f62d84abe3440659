import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import {
	askClearance,
	giveClearance,
	holdClearance,
	withdrawClearance,
	withholdClearance
} from '$lib/server/clearances/actions';
import { db } from '$lib/server/db';
import { clearances, operations } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { newId } from '$lib/server/ids';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { acceptReferral, declineReferral, refer, withdrawReferral } from '$lib/server/referrals/actions';
import { postEntry } from '$lib/server/threads/actions';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const as = (role: keyof Hospital['people'], seconds = 0) =>
	contextOf(hospital.people[role], hospital.now + seconds * 1000);
const ALL = { limit: 200, after: null };

async function referred() {
	const asked = { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' } as const;
	return (await refer(as('surgeon'), episodeId, asked)).result;
}

const endsOf = (role: keyof Hospital['people']) => looseEndsOf(db(), hospital.people[role], hospital.now);
const about = (ends: { episodeId: string | null; kind: string }[]) =>
	ends.filter((end) => end.episodeId === episodeId).map((end) => end.kind);

describe('a referral', () => {
	it('to a service that has one already is a question and a thread of its own', async () => {
		const [first, second] = [await referred(), await referred()];
		expect(second).toMatchObject({ state: 'asked' });
		expect(second.threadId).not.toBe(first.threadId);
		expect(about((await endsOf('therapist')).mine)).toEqual(['referral', 'referral']);
	});

	it('waits on the service, and the one who asked waits for it', async () => {
		await referred();
		expect(about((await endsOf('therapist')).mine)).toEqual(['referral']);
		expect(about((await endsOf('surgeon')).theirs)).toEqual(['referral']);
		expect(about((await endsOf('speech-therapist')).mine)).toEqual([]);
		expect(about((await endsOf('nurse')).mine)).toEqual([]);
	});

	it('is nobody’s loose end once accepted, and its thread says so', async () => {
		const { id, threadId } = await referred();
		expect((await acceptReferral(as('therapist', 60), id)).result).toEqual({ id, state: 'accepted' });
		expect(about((await endsOf('therapist')).mine)).toEqual([]);
		const thread = await getThread(db(), hospital.people.nurse, threadId, ALL);
		expect(thread.items.map(({ seq, kind, strand }) => [seq, kind, strand])).toEqual([
			[1, 'ask', 'medical'],
			[2, 'answer', 'therapy']
		]);
	});

	it('cannot be accepted twice or after it was declined', async () => {
		const { id } = await referred();
		await declineReferral(as('therapist'), id, 'Not before tomorrow.');
		await expect(acceptReferral(as('therapist'), id)).rejects.toMatchObject({
			code: 'wrong-state',
			extra: { state: 'declined' }
		});
	});

	it.each(['surgeon', 'nurse', 'speech-therapist', 'coordinator'] as const)(
		'to physiotherapy is not accepted by a %s',
		async (role) => {
			const { id } = await referred();
			await expect(acceptReferral(as(role), id)).rejects.toMatchObject({ code: 'not-allowed' });
		}
	);

	it('is withdrawn only by the person who asked, and its thread takes no more entries', async () => {
		const { id, threadId } = await referred();
		await expect(withdrawReferral(as('physician'), id, 'x')).rejects.toMatchObject({ code: 'not-allowed' });
		await withdrawReferral(as('surgeon'), id, 'Asked twice.');
		const posted = postEntry(as('nurse'), threadId, { body: 'Hello' });
		await expect(posted).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('does not exist for somebody of another unit', async () => {
		const { id, threadId } = await referred();
		const outside = contextOf(hospital.outsider);
		await expect(withdrawReferral(outside, id, 'x')).rejects.toMatchObject({ code: 'not-found' });
		await expect(getThread(db(), hospital.outsider, threadId, ALL)).rejects.toMatchObject({
			code: 'not-found'
		});
		await expect(postEntry(outside, threadId, { body: 'x' })).rejects.toMatchObject({ code: 'not-found' });
	});

	it('has talk from every clinical role that sees the patient, and pages through it', async () => {
		const { threadId } = await referred();
		for (const role of ['nurse', 'physician', 'therapist', 'speech-therapist'] as const) {
			const { result } = await postEntry(as(role), threadId, { body: `from ${role}` });
			expect(result).toMatchObject({ author: { role }, body: `from ${role}` });
		}
		const first = await getThread(db(), hospital.people.nurse, threadId, { limit: 2, after: null });
		expect(first.next).toBe('2');
		const rest = await getThread(db(), hospital.people.nurse, threadId, { limit: 10, after: first.next });
		expect(rest.items.map((item) => item.seq)).toEqual([3, 4, 5]);
		expect(rest.next).toBeNull();
	});
});

describe('a clearance', () => {
	const ask = (kind: 'arm-stage' | 'stairs' = 'arm-stage') =>
		askClearance(as('therapist'), episodeId, { kind, question: 'Wound dry. May it start?' });

	it('is asked with its evidence, given with a limit, and shown as cleared with limits', async () => {
		const { id, evidence } = (await ask()).result;
		expect(evidence).toMatchObject({ procedure: 'Coronary artery bypass', postOpDay: 2, level: 2 });
		const limits = { maxElevationDeg: 90 };
		expect((await giveClearance(as('surgeon'), id, { limits })).result.state).toBe('given-with-limits');
		const board = await getNameboard(db(), hospital.people.therapist, episodeId, hospital.now);
		expect(board.clearances).toMatchObject([{ kind: 'arm-stage', state: 'given-with-limits', limits }]);
		expect(board.precautions.maxElevationDeg).toBe(90);
	});

	it('is given without limits when none are named', async () => {
		const { id } = (await ask()).result;
		expect((await giveClearance(as('surgeon'), id, { limits: {} })).result.state).toBe('given');
	});

	it('is not asked a second time while it is open or in force', async () => {
		const { id } = (await ask()).result;
		await expect(ask()).rejects.toMatchObject({ code: 'already-asked' });
		await giveClearance(as('surgeon'), id, {});
		await expect(ask()).rejects.toMatchObject({ code: 'already-given' });
	});

	it('can be asked again after it was withheld, withdrawn or lapsed', async () => {
		await withholdClearance(as('surgeon'), (await ask()).result.id, 'Wound is wet.');
		const second = (await ask()).result.id;
		await giveClearance(as('surgeon'), second, { reviewOn: '2026-03-04' });
		await withdrawClearance(as('surgeon'), second, 'Click felt.');
		const third = (await ask()).result.id;
		await giveClearance(as('surgeon'), third, { reviewOn: '2026-03-03' });
		const tomorrow = as('therapist', 24 * 3600);
		const again = await askClearance(tomorrow, episodeId, { kind: 'arm-stage', question: 'Review?' });
		expect(again.result.state).toBe('asked');
		const [lapsed] = await db().select().from(clearances).where(eq(clearances.id, third));
		expect(lapsed?.state).toBe('lapsed');
	});

	it('has one decision of two who decide at once', async () => {
		const { id } = (await ask('stairs')).result;
		const answers = await Promise.allSettled([
			withholdClearance(as('physician'), id, 'Not today.'),
			withholdClearance(as('surgeon'), id, 'No.')
		]);
		expect(answers.map((answer) => answer.status).toSorted()).toEqual(['fulfilled', 'rejected']);
	});

	it.each([
		['physician', 'arm-stage', 'not-allowed'],
		['physician', 'stairs', null],
		['surgeon', 'stairs', null],
		['speech-therapist', 'stairs', 'not-allowed'],
		['nurse', 'stairs', 'not-allowed'],
		['therapist', 'arm-stage', 'not-allowed']
	] as const)('by a %s of the kind %s answers %s', async (role, kind, code) => {
		const { id } = (await ask(kind)).result;
		const outcome = await giveClearance(as(role), id, {}).then(
			() => null,
			(error: { code: string }) => error.code
		);
		expect(outcome).toBe(code);
	});

	it('on hold is not in force and can be given again', async () => {
		const { id } = (await ask('stairs')).result;
		await giveClearance(as('surgeon'), id, {});
		await holdClearance(as('surgeon'), id, 'Fell yesterday.');
		const board = await getNameboard(db(), hospital.people.nurse, episodeId, hospital.now);
		expect(board.mayDoNow?.stairs).toBe('not');
		expect((await giveClearance(as('surgeon'), id, {})).result.state).toBe('given');
	});

	it('taken back before anybody decided holds nothing, taken back afterwards does', async () => {
		const held = await addPatient({ unitId: hospital.units.ward });
		const kind = 'out-of-bed' as const;
		const { id } = (await askClearance(as('therapist'), held.episodeId, { kind, question: 'May she?' }))
			.result;
		const chair = async () =>
			(await getNameboard(db(), hospital.people.nurse, held.episodeId, hospital.now)).mayDoNow?.chair;
		await withdrawClearance(as('therapist'), id, 'Asked too early.');
		expect(await chair()).toBe('one');
		const second = (await askClearance(as('therapist'), held.episodeId, { kind, question: 'And now?' }))
			.result;
		await giveClearance(as('surgeon'), second.id, {});
		await withdrawClearance(as('surgeon'), second.id, 'Bleeding.');
		expect(await chair()).toBe('not');
	});

	it('counts from the latest operation: a return to theatre makes it void', async () => {
		const { id } = (await ask()).result;
		await giveClearance(as('surgeon'), id, { limits: { maxElevationDeg: 90 } });
		await db()
			.insert(operations)
			.values({
				id: newId(),
				episodeId,
				procedure: 'Re-opening for bleeding',
				approach: 'sternotomy',
				operatedAt: hospital.now - 3600_000,
				createdAt: hospital.now
			});
		const board = await getNameboard(db(), hospital.people.therapist, episodeId, hospital.now);
		expect(board).toMatchObject({ postOpDay: 0, precautions: { maxElevationDeg: 45 } });
		expect((await ask()).result.state).toBe('asked');
	});

	it('refuses a review date that is past', async () => {
		const { id } = (await ask()).result;
		const given = giveClearance(as('surgeon'), id, { reviewOn: '2026-03-02' });
		await expect(given).rejects.toMatchObject({ extra: { errors: [{ pointer: '/reviewOn' }] } });
	});
});
