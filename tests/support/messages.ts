import { and, asc, eq } from 'drizzle-orm';
import { db, transact } from '$lib/server/db';
import {
	escalationLinks,
	escalations,
	outbox,
	outboxAttempts,
	reminders,
	visits
} from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { linkDigest, linkToken } from '$lib/server/links';
import { enqueue, type NewMessage } from '$lib/server/outbox/enqueue';
import { HOSPITAL_NOW, ZONE, type Hospital } from './hospital';

const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;

export async function rowOf(id: string) {
	const [row] = await db().select().from(outbox).where(eq(outbox.id, id));
	if (!row) {
		throw new Error(`There is no message ${id}.`);
	}
	return row;
}

export async function attemptsOf(id: string) {
	return db()
		.select()
		.from(outboxAttempts)
		.where(eq(outboxAttempts.messageId, id))
		.orderBy(asc(outboxAttempts.number));
}

/** The reminders of a visit, the first that is due first. */
export function remindersOf(visitId: string) {
	return db()
		.select()
		.from(outbox)
		.where(and(eq(outbox.refId, visitId), eq(outbox.kind, 'reminder')))
		.orderBy(asc(outbox.nextAt));
}

/** An untaken escalation of the hospital's patient. Ends others first, because a patient has one untaken at most. */
export async function addEscalation(
	hospital: Hospital,
	change: Partial<typeof escalations.$inferInsert> = {}
): Promise<string> {
	await db().update(escalations).set({ state: 'withdrawn' }).where(eq(escalations.state, 'raised'));
	const id = newId();
	await db()
		.insert(escalations)
		.values({
			id,
			episodeId: hospital.episodeId,
			unitId: hospital.units.ward,
			grade: 'high',
			state: 'raised',
			situation: 'Dizzy on standing.',
			background: 'Day two.',
			assessment: 'Pressure falls.',
			request: 'Please come.',
			raisedBy: hospital.people.therapist.id,
			raisedAt: HOSPITAL_NOW,
			chainStartedAt: HOSPITAL_NOW,
			...change
		});
	return id;
}

/** An alert of an escalation to one person, with its link, in the outbox. */
export async function addAlert(
	escalationId: string,
	userId: string,
	change: Partial<NewMessage> = {},
	link: Partial<typeof escalationLinks.$inferInsert> = {}
): Promise<{ id: string; linkId: string }> {
	const id = newId();
	const linkId = newId();
	await db()
		.insert(escalationLinks)
		.values({
			id: linkId,
			escalationId,
			userId,
			tokenHash: linkDigest(linkToken(linkId)),
			createdAt: HOSPITAL_NOW,
			expiresAt: HOSPITAL_NOW + 12 * HOUR,
			...link
		});
	const message: NewMessage = {
		id,
		kind: 'escalation',
		channel: 'sms',
		causeKey: `test:${id}`,
		userId,
		body: 'Ropewalk HIGH: Tern Ward, bed 4. To take it open {link}',
		linkId,
		ref: { kind: 'escalation', id: escalationId },
		expiresAt: HOSPITAL_NOW + HOUR,
		...change
	};
	await transact((tx) => enqueue(tx, HOSPITAL_NOW, [message]));
	return { id, linkId };
}

export async function addVisit(
	hospital: Hospital,
	change: Partial<typeof visits.$inferInsert> = {}
): Promise<string> {
	const id = newId();
	const startsAt = change.startsAt ?? HOSPITAL_NOW + DAY;
	await db()
		.insert(visits)
		.values({
			id,
			episodeId: hospital.episodeId,
			localDate: new Date(startsAt).toISOString().slice(0, 10),
			localTime: new Date(startsAt).toISOString().slice(11, 16),
			zone: ZONE,
			minutes: 45,
			unitId: hospital.units.gym,
			place: 'East Gym',
			state: 'planned',
			bookedBy: hospital.people.coordinator.id,
			bookedAt: HOSPITAL_NOW - DAY,
			...change,
			startsAt
		});
	return id;
}

/** A reminder of a visit, in the outbox; `now` is the instant that it becomes due. */
export async function addReminder(
	visitId: string,
	patientId: string,
	change: Partial<NewMessage> = {}
): Promise<string> {
	const id = newId();
	const message: NewMessage = {
		id,
		kind: 'reminder',
		channel: 'sms',
		causeKey: `test:${id}`,
		patientId,
		body: `Your visit is tomorrow (${id}).`,
		ref: { kind: 'visit', id: visitId },
		expiresAt: HOSPITAL_NOW + DAY,
		...change
	};
	await db().insert(reminders).values({ id: newId(), visitId, dueAt: HOSPITAL_NOW, messageId: id });
	await transact((tx) => enqueue(tx, HOSPITAL_NOW, [message]));
	return id;
}
