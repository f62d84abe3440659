import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import type { PersonContext } from '$lib/server/context';
import { db } from '$lib/server/db';
import { audit, inboundMessages, liveEvents, outbox } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { settleInbound, settleMessage } from '$lib/server/messages/settle';
import { HOSPITAL_NOW, addPerson, contextOf, newPhone } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { addReminder, addVisit, rowOf } from '../support/messages';

const hospital = await openHospital({});

async function failedMessage(state: 'failed' | 'undelivered' | 'delivered', change = {}): Promise<string> {
	const id = await addReminder(await addVisit(hospital), hospital.patient.id);
	await db()
		.update(outbox)
		.set({ state, ...change })
		.where(eq(outbox.id, id));
	return id;
}

async function inboundText(patientId: string | null): Promise<string> {
	const id = newId();
	await db().insert(inboundMessages).values({
		id,
		providerId: id,
		fromNumber: newPhone(),
		body: 'Hello?',
		at: HOSPITAL_NOW,
		patientId,
		understoodAs: 'other'
	});
	return id;
}

const open = async () => {
	const { mine } = await looseEndsOf(db(), hospital.people.coordinator, HOSPITAL_NOW);
	return mine.map(({ id }) => id);
};

const settleText = (context: PersonContext, id: string) =>
	settleInbound(context, id, { note: 'Called her, all is well.' });

const CASES = [
	['a message that failed', () => failedMessage('failed'), settleMessage],
	['a message that did not arrive', () => failedMessage('undelivered'), settleMessage],
	['a text of a patient', () => inboundText(hospital.patient.id), settleText],
	['a text of nobody we know', () => inboundText(null), settleText]
] as const;

describe.each(CASES)('%s', (_, make, settle) => {
	it('is open until somebody has seen to it, once, on record', async () => {
		const id = await make();
		expect(await open()).toContain(id);
		const { result } = await settle(contextOf(hospital.people.coordinator), id);
		expect(result).toEqual({ id });
		expect(await open()).not.toContain(id);
		const [row] = await db().select().from(audit).where(eq(audit.objectId, id));
		expect(row).toMatchObject({ action: 'message.settled', actorId: hospital.people.coordinator.id });
		const events = await db().select().from(liveEvents).where(eq(liveEvents.subjectId, id));
		expect(events.map(({ kind }) => kind)).toContain('settled');
		const again = contextOf(hospital.people.coordinator, HOSPITAL_NOW + 1);
		await expect(settle(again, id)).rejects.toMatchObject({
			code: 'wrong-state'
		});
	});

	it('is not everybody’s to see to', async () => {
		const id = await make();
		await expect(settle(contextOf(hospital.people.nurse), id)).rejects.toMatchObject({ code: 'not-allowed' });
		expect(await open()).toContain(id);
	});
});

describe.each(CASES.slice(0, 3))('%s', (_, make, settle) => {
	it('cannot be seen from another unit', async () => {
		const id = await make();
		const stranger = await addPerson({ role: 'coordinator', unitIds: [] });
		await expect(settle(contextOf(stranger), id)).rejects.toMatchObject({ code: 'not-found' });
	});
});

it.each([
	['that arrived', () => failedMessage('delivered'), 'wrong-state'],
	['to an account', () => failedMessage('failed', { refKind: 'account' }), 'not-found'],
	['that is not there', () => Promise.resolve('nothing'), 'not-found']
])('a message %s is not settled', async (_, make, code) => {
	const id = await make();
	await expect(settleMessage(contextOf(hospital.people.coordinator), id)).rejects.toMatchObject({ code });
	expect(code === 'not-found' || (await rowOf(id)).handledAt === null).toBe(true);
});
