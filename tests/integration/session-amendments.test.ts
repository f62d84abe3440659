import { beforeEach, describe, expect, it } from 'vitest';
import { amendSession } from '$lib/server/bedside/amend';
import { recordSession } from '$lib/server/bedside/actions';
import { listSessions } from '$lib/server/bedside/queries';
import { askClearance } from '$lib/server/clearances/actions';
import { db } from '$lib/server/db';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { getThread } from '$lib/server/threads/queries';
import { addPatient, addPerson, addReferral, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { sessionAt, sessionBody } from '../support/session';

const hospital = await openHospital();
const { nurse, surgeon, therapist } = hospital.people;
let episodeId: string;
let sessionId: string;

beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	sessionId = (await recordSession(contextOf(therapist), episodeId, sessionBody())).result.id;
});

const amend = (
	kind: 'amended' | 'entered-in-error',
	who = therapist,
	body = 'The pulse was counted twice.'
) => amendSession(contextOf(who), episodeId, { sessionId, kind, body });
const session = async () => (await listSessions(db(), nurse, episodeId))[0];
const evidenceOf = async () => {
	const ask = { kind: 'stairs', question: 'May she?' } as const;
	return (await askClearance(contextOf(therapist), episodeId, ask)).result.evidence.sessions;
};

describe('a session on record', () => {
	it('is amended below what it says, by name, also in the thread', async () => {
		const { threadId } = await addReferral({ episodeId, askedBy: surgeon.id });
		const before = await session();
		await amend('amended', nurse);
		const body = 'The pulse was counted twice.';
		expect(await session()).toEqual({
			...before,
			amendments: [{ kind: 'amended', body, by: nurse.name, at: expect.any(String) }]
		});
		const { items } = await getThread(db(), nurse, threadId, { limit: 200, after: null });
		expect(items.at(-1)?.body).toContain(body);
		expect(await evidenceOf()).toHaveLength(1);
	});

	it('that was entered in error stays readable and counts for nothing', async () => {
		await amend('entered-in-error', therapist, 'It was the next patient.');
		expect(await session()).toMatchObject({ id: sessionId, amendments: [{ kind: 'entered-in-error' }] });
		expect(await evidenceOf()).toEqual([]);
		await expect(amend('amended')).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('that was entered in error does not keep what an earlier one told of the rhythm from the record', async () => {
		const board = async () => getNameboard(db(), nurse, episodeId, hospital.now);
		const begun = hospital.now - 5 * 60 * 60_000;
		const { context, ...earlier } = sessionBody(sessionAt(begun));
		const fibrillating = { ...earlier, context: { ...context, rhythm: 'atrial-fibrillation' as const } };
		await recordSession(contextOf(therapist), episodeId, fibrillating);
		expect((await board()).rhythm).toBe('sinus');
		await amend('entered-in-error', therapist, 'It was the next patient.');
		await recordSession(contextOf(therapist), episodeId, { ...fibrillating, ...sessionAt(begun + 60_000) });
		expect((await board()).rhythm).toBe('atrial-fibrillation');
	});

	it('is called an error only by who recorded it', async () => {
		const colleague = await addPerson({ role: 'therapist', unitIds: [hospital.units.ward] });
		await expect(amend('entered-in-error', colleague)).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('of another stay is not there, and a surgeon amends none', async () => {
		const other = await addPatient({ unitId: hospital.units.ward });
		const input = { sessionId, kind: 'amended', body: 'More.' } as const;
		const foreign = amendSession(contextOf(therapist), other.episodeId, input);
		await expect(foreign).rejects.toMatchObject({ code: 'invalid' });
		await expect(amend('amended', surgeon)).rejects.toMatchObject({ code: 'not-allowed' });
	});
});
