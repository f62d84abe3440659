import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { notFound } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { PatientLine } from '$lib/domain/episodes/views';
import type { FailedMessageView, InboundTextView } from '$lib/domain/messages/views';
import { m } from '$lib/i18n/paraglide/messages';
import { accessInboundText, accessMessage, type InboundRow, type MessageRow } from '../access/messages';
import { db, type Reader } from '../db';
import { episodes, patients, users } from '../db/schema';
import { patientLine } from '../episodes/list';

/**
 * One message that did not arrive.
 * @throws Problem `not-found` outside the person's units, and for a message that did not fail
 */
export async function getFailedMessage(person: Person, id: string): Promise<FailedMessageView> {
	const { message, episodeId } = await accessMessage(db(), person, id);
	if (message.state !== 'failed' && message.state !== 'undelivered') {
		throw notFound('message');
	}
	return {
		id: message.id,
		body: message.body.replaceAll('{link}', '').trim(),
		channel: message.channel,
		to: await recipientOf(db(), message),
		patient: await patientOf(db(), episodeId),
		episodeId,
		createdAt: toRfc3339(message.createdAt),
		reason: message.stateReason,
		settled: message.handledAt !== null
	};
}

/**
 * One text that came in.
 * @throws Problem `not-found` for one that this person may not see to
 */
export async function getInboundText(person: Person, id: string): Promise<InboundTextView> {
	const { text, episodeId } = await accessInboundText(db(), person, id);
	const patient = await patientOf(db(), episodeId);
	const staff = text.userId === null ? null : await userById(db(), text.userId);
	return {
		id: text.id,
		body: text.body,
		from: { name: patient?.name ?? staff?.name ?? nameOfNobody(text), phone: text.fromNumber },
		patient,
		episodeId,
		at: toRfc3339(text.at),
		settled: text.handledAt !== null,
		done: await doneAbout(text)
	};
}

/** Whose a shared number might be is not told. */
function nameOfNobody({ understoodAs }: InboundRow): string {
	return understoodAs === 'shared-number' ? m.home_shared_number() : '';
}

async function doneAbout({
	handledNote,
	handledBy,
	handledAt
}: InboundRow): Promise<InboundTextView['done']> {
	if (handledNote === null || handledBy === null || handledAt === null) {
		return null;
	}
	const by = await userById(db(), handledBy);
	return { note: handledNote, by: by?.name ?? '', at: toRfc3339(handledAt) };
}

async function recipientOf(reader: Reader, row: MessageRow) {
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
