import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { notFound } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { PatientLine } from '$lib/domain/episodes/views';
import type { FailedMessageView, InboundTextView } from '$lib/domain/messages/views';
import { accessEpisode } from '../access/access';
import { requirePermission } from '../access/require';
import { db, type Reader } from '../db';
import { episodes, inboundMessages, outbox, patients, users } from '../db/schema';
import { patientLine } from '../episodes/list';
import { episodeOfMessage, newestEpisode } from '../outbox/change';

/** The same people who may settle it: `settle.ts`. */
const PERMISSION = 'visit.plan';

/**
 * One message that did not arrive.
 * @throws Problem `not-found` outside the person's units, and for a message that did not fail
 */
export async function getFailedMessage(person: Person, id: string): Promise<FailedMessageView> {
	const [row] = await db().select().from(outbox).where(eq(outbox.id, id));
	const episodeId = row ? await episodeOfMessage(db(), row) : null;
	const failed = row?.state === 'failed' || row?.state === 'undelivered';
	// What goes to accounts is the administrator's, and may carry an invitation.
	if (!row || !failed || row.refKind === 'account') {
		throw notFound('message');
	}
	await requireAccess(person, episodeId);
	return {
		id: row.id,
		body: row.body.replaceAll('{link}', '').trim(),
		channel: row.channel,
		to: await recipientOf(db(), row),
		patient: await patientOf(db(), episodeId),
		episodeId,
		createdAt: toRfc3339(row.createdAt),
		reason: row.stateReason,
		settled: row.handledAt !== null
	};
}

/**
 * One text that came in. From a number nobody knows it is anybody's who may see to it at all.
 * @throws Problem `not-found`
 */
export async function getInboundText(person: Person, id: string): Promise<InboundTextView> {
	const [row] = await db().select().from(inboundMessages).where(eq(inboundMessages.id, id));
	if (!row) {
		throw notFound('text');
	}
	const episodeId = row.patientId === null ? null : await newestEpisode(db(), row.patientId);
	await requireAccess(person, episodeId);
	const patient = await patientOf(db(), episodeId);
	const staff = row.userId === null ? null : await userById(db(), row.userId);
	return {
		id: row.id,
		body: row.body,
		from: { name: patient?.name ?? staff?.name ?? '', phone: row.fromNumber },
		patient,
		episodeId,
		at: toRfc3339(row.at),
		settled: row.handledAt !== null
	};
}

async function requireAccess(person: Person, episodeId: string | null): Promise<void> {
	requirePermission(person, PERMISSION);
	if (episodeId !== null) {
		await accessEpisode(db(), person, episodeId, PERMISSION);
	}
}

async function recipientOf(reader: Reader, row: typeof outbox.$inferSelect) {
	if (row.userId !== null) {
		return userById(reader, row.userId);
	}
	if (row.patientId === null) {
		return null;
	}
	const [patient] = await reader
		.select({ name: patients.name, phone: patients.phone })
		.from(patients)
		.where(eq(patients.id, row.patientId));
	return patient ?? null;
}

async function userById(reader: Reader, id: string) {
	const [user] = await reader
		.select({ name: users.name, phone: users.phone })
		.from(users)
		.where(eq(users.id, id));
	return user ?? null;
}

async function patientOf(reader: Reader, episodeId: string | null): Promise<PatientLine | null> {
	if (episodeId === null) {
		return null;
	}
	const [row] = await reader
		.select({ patient: patients })
		.from(patients)
		.innerJoin(episodes, eq(episodes.patientId, patients.id))
		.where(eq(episodes.id, episodeId));
	return row ? patientLine(row.patient) : null;
}
