import { beforeAll, describe, expect, it } from 'vitest';
import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { db } from '$lib/server/db';
import { audit, entries, inboundMessages, outbox, visits } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { settleInbound, settleMessage } from '$lib/server/messages/settle';
import { getFailedMessage, getInboundText } from '$lib/server/messages/to-see-to';
import { bookVisits, followUpVisit } from '$lib/server/visits/actions';
import { addReferral, contextOf, HOSPITAL_NOW, newPhone } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const DAY = 24 * 60 * 60 * 1000;

const hospital = await openHospital();
let visitId: string;

beforeAll(async () => {
	const input = { kind: 'single', startsAt: HOSPITAL_NOW + 5 * DAY, minutes: 45, place: 'East Gym' } as const;
	const { result } = await bookVisits(contextOf(hospital.people.coordinator), hospital.episodeId, input);
	visitId = result.items[0]?.id ?? '';
});

type NewMessage = Partial<typeof outbox.$inferInsert>;

async function message(given: NewMessage = {}): Promise<string> {
	const id = newId();
	await db()
		.insert(outbox)
		.values({
			id,
			kind: 'reminder',
			channel: 'sms',
			causeKey: id,
			patientId: hospital.patient.id,
			body: 'Your visit is on Sunday. {link}',
			refKind: 'visit',
			refId: visitId,
			state: 'undelivered',
			stateReason: '30003',
			createdAt: HOSPITAL_NOW,
			nextAt: HOSPITAL_NOW,
			expiresAt: HOSPITAL_NOW + DAY,
			...given
		});
	return id;
}

async function text(patientId: string | null): Promise<string> {
	const id = newId();
	await db()
		.insert(inboundMessages)
		.values({
			id,
			providerId: id,
			fromNumber: patientId === null ? newPhone() : hospital.patient.phone,
			body: 'May I bring my sister?',
			at: HOSPITAL_NOW,
			patientId,
			understoodAs: 'other'
		});
	return id;
}

const open = async (person: Person) =>
	(await looseEndsOf(db(), person, HOSPITAL_NOW)).mine.map(({ kind, id }) => `${kind} ${id}`);

describe('a message that did not arrive', () => {
	it.each([
		['the link to the patient’s page', { kind: 'page', refKind: 'page' }],
		['a mail with the visits of a series', { kind: 'mail', channel: 'mail', refKind: 'episode' }]
	] as const)('waits on the coordinator: %s', async (_what, given) => {
		const id = await message({ ...given, refId: hospital.episodeId, state: 'failed' });
		expect(await open(hospital.people.coordinator)).toContain(`message-failed ${id}`);
	});

	it('waits on the coordinator: an answer to a patient’s text, where the text is filed', async () => {
		const id = await message({ kind: 'answer', refKind: 'inbound', refId: await text(hospital.patient.id) });
		expect(await open(hospital.people.coordinator)).toContain(`message-failed ${id}`);
		expect((await getFailedMessage(hospital.people.coordinator, id)).to?.phone).toBe(hospital.patient.phone);
	});

	it('shows whom to call and what it was to say, without its link', async () => {
		const id = await message();
		expect(await getFailedMessage(hospital.people.coordinator, id)).toMatchObject({
			body: 'Your visit is on Sunday.',
			to: { name: hospital.patient.name, phone: hospital.patient.phone },
			patient: { birthDate: '1958-09-05' },
			episodeId: hospital.episodeId,
			reason: '30003',
			settled: false
		});
	});

	it('shows the colleague it was for', async () => {
		const { nurse, coordinator } = hospital.people;
		const id = await message({ userId: nurse.id, patientId: null });
		expect((await getFailedMessage(coordinator, id)).to?.name).toBe(nurse.name);
	});

	it('is no loose end any more once it is seen to', async () => {
		const { coordinator } = hospital.people;
		const id = await message();
		expect(await open(coordinator)).toContain(`message-failed ${id}`);
		await settleMessage(contextOf(coordinator), id);
		expect(await open(coordinator)).not.toContain(`message-failed ${id}`);
		expect((await getFailedMessage(coordinator, id)).settled).toBe(true);
	});

	it.each<[string, NewMessage]>([
		['that arrived', { state: 'delivered' }],
		['that waits', { state: 'ready' }],
		['to an account, which may carry an invitation', { refKind: 'account', refId: 'a' }]
	])('is not there for one %s', async (_, given) => {
		const id = await message(given);
		await expect(getFailedMessage(hospital.people.coordinator, id)).rejects.toMatchObject({
			code: 'not-found'
		});
	});
});

describe('a text that no rule understood', () => {
	it('shows who wrote, and the words', async () => {
		const id = await text(hospital.patient.id);
		expect(await getInboundText(hospital.people.coordinator, id)).toMatchObject({
			body: 'May I bring my sister?',
			from: { name: hospital.patient.name, phone: hospital.patient.phone },
			episodeId: hospital.episodeId
		});
	});

	it('from an unknown number belongs to nobody', async () => {
		const found = await getInboundText(hospital.people.coordinator, await text(null));
		expect([found.patient, found.episodeId, found.from.name]).toEqual([null, null, '']);
	});

	it('is no loose end any more once it is seen to', async () => {
		const { coordinator } = hospital.people;
		const id = await text(hospital.patient.id);
		expect(await open(coordinator)).toContain(`inbound ${id}`);
		const note = 'Called her: her sister may come.';
		await settleInbound(contextOf(coordinator), id, { note });
		expect(await open(coordinator)).not.toContain(`inbound ${id}`);
		expect(await getInboundText(coordinator, id)).toMatchObject({
			settled: true,
			done: { note, by: coordinator.name, at: '2026-03-03T09:00:00.000Z' }
		});
	});
});

describe('what was done about a text', () => {
	it('stands in the thread with the words of the patient, by name, and on record without them', async () => {
		const { coordinator, surgeon } = hospital.people;
		const { threadId } = await addReferral({ episodeId: hospital.episodeId, askedBy: surgeon.id });
		const id = await text(hospital.patient.id);
		await settleInbound(contextOf(coordinator), id, { note: 'Called her back at 9.' });
		const lines = await db().select().from(entries).where(eq(entries.threadId, threadId));
		expect(lines).toMatchObject([
			{
				kind: 'event',
				strand: 'patient',
				authorId: coordinator.id,
				body: 'Text of the patient: "May I bring my sister?". Seen to: Called her back at 9.'
			}
		]);
		const [onRecord] = await db().select().from(audit).where(eq(audit.objectId, id));
		expect(onRecord).toMatchObject({ action: 'message.settled', actorId: coordinator.id });
		expect(JSON.stringify(onRecord)).not.toMatch(/sister|Called/);
		const [row] = await db().select().from(inboundMessages).where(eq(inboundMessages.id, id));
		expect(row).toMatchObject({ handledNote: 'Called her back at 9.', handledBy: coordinator.id });
	});
});

describe('who may read them', () => {
	it.each(['nurse', 'surgeon', 'physician', 'admin'] as const)('a %s may not', async (role) => {
		const [failed, inbound] = [await message(), await text(hospital.patient.id)];
		const refused = { code: 'not-allowed' };
		await expect(getFailedMessage(hospital.people[role], failed)).rejects.toMatchObject(refused);
		await expect(getInboundText(hospital.people[role], inbound)).rejects.toMatchObject(refused);
	});

	it('a coordinator of another unit learns nothing', async () => {
		const stranger: Person = { ...hospital.people.coordinator, unitIds: hospital.outsider.unitIds };
		const [failed, inbound] = [await message(), await text(hospital.patient.id)];
		await expect(getFailedMessage(stranger, failed)).rejects.toMatchObject({ code: 'not-found' });
		await expect(getInboundText(stranger, inbound)).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('a visit that the patient cancelled', () => {
	it('is a loose end until it is followed up', async () => {
		const { coordinator } = hospital.people;
		await db()
			.update(visits)
			.set({ state: 'cancelled', patientCancelledAt: HOSPITAL_NOW, decidedAt: HOSPITAL_NOW })
			.where(eq(visits.id, visitId));
		expect(await open(coordinator)).toContain(`visit-cancelled ${visitId}`);
		await followUpVisit(contextOf(coordinator), visitId);
		expect(await open(coordinator)).not.toContain(`visit-cancelled ${visitId}`);
	});
});
