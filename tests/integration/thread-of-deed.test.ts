import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { recordSession } from '$lib/server/bedside/actions';
import { askClearance } from '$lib/server/clearances/actions';
import { db } from '$lib/server/db';
import { clearances, escalations } from '$lib/server/db/schema';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { getThread } from '$lib/server/threads/queries';
import { CALL } from '../support/escalations';
import { addPatient, addReferral, contextOf, HOSPITAL_NOW } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { sessionBody } from '../support/session';

/** Two services treat one patient, each in its own thread: what is done stands where it belongs. */

const hospital = await openHospital();
let episodeId: string;
let physiotherapy: string;
let speech: string;

const HOUR = 60 * 60 * 1000;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	const asked = { episodeId, askedBy: hospital.people.surgeon.id };
	const first = { ...asked, service: 'physiotherapy', askedAt: HOSPITAL_NOW - 2 * HOUR } as const;
	const later = { ...asked, service: 'speech-therapy', askedAt: HOSPITAL_NOW - HOUR } as const;
	physiotherapy = (await addReferral(first)).threadId;
	speech = (await addReferral(later)).threadId;
});

async function kindsIn(threadId: string): Promise<string[]> {
	const all = { limit: 200, after: null };
	return (await getThread(db(), hospital.people.nurse, threadId, all)).items.map(({ kind }) => kind);
}

/** The thread of a patient whom the same people treat, so that no right stands between. */
async function threadOfAnother(): Promise<string> {
	const other = await addPatient({ unitId: hospital.units.ward });
	return (await addReferral({ episodeId: other.episodeId, askedBy: hospital.people.surgeon.id })).threadId;
}

describe('a session', () => {
	it.each([
		['therapist', () => physiotherapy, () => speech],
		['speech-therapist', () => speech, () => physiotherapy],
		['nurse', () => speech, () => physiotherapy]
	] as const)('of a %s is told in one thread', async (role, own, other) => {
		await recordSession(contextOf(hospital.people[role]), episodeId, sessionBody());
		expect(await kindsIn(own())).toEqual(['session']);
		expect(await kindsIn(other())).toEqual([]);
	});
});

describe('a call for help', () => {
	it('stands in the thread from which it was raised', async () => {
		await raiseEscalation(contextOf(hospital.people.therapist), episodeId, { ...CALL, threadId: speech });
		expect(await kindsIn(speech)).toHaveLength(1);
		expect(await kindsIn(physiotherapy)).toEqual([]);
	});

	it('raised with the thread of another patient is refused, and nothing of it is written', async () => {
		const threadId = await threadOfAnother();
		const call = raiseEscalation(contextOf(hospital.people.therapist), episodeId, { ...CALL, threadId });
		await expect(call).rejects.toMatchObject({ code: 'not-found' });
		expect(await db().select().from(escalations).where(eq(escalations.episodeId, episodeId))).toEqual([]);
		expect(await kindsIn(threadId)).toEqual([]);
	});

	it('raised from a thread that was withdrawn is heard all the same, and stands in another', async () => {
		const withdrawn = await addReferral({
			...{ episodeId, askedBy: hospital.people.surgeon.id },
			...{ service: 'outpatient-programme', state: 'withdrawn' }
		});
		const call = { ...CALL, threadId: withdrawn.threadId };
		const { result } = await raiseEscalation(contextOf(hospital.people.therapist), episodeId, call);
		expect(result.state).toBe('raised');
		expect(await kindsIn(physiotherapy)).toHaveLength(1);
	});
});

describe('an ask for a clearance', () => {
	it('with the thread of another patient is refused, and nothing of it is written', async () => {
		const threadId = await threadOfAnother();
		const ask = { kind: 'arm-stage', question: 'May it start?', threadId } as const;
		const asked = askClearance(contextOf(hospital.people.therapist), episodeId, ask);
		await expect(asked).rejects.toMatchObject({ code: 'not-found' });
		expect(await db().select().from(clearances).where(eq(clearances.episodeId, episodeId))).toEqual([]);
		expect(await kindsIn(threadId)).toEqual([]);
	});
});
