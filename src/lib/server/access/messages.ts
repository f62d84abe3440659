import { and, eq, sql, type SQL } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { notFound } from '$lib/domain/core/errors';
import type { Reader } from '../db';
import { inboundMessages, outbox } from '../db/schema';
import { episodeOfMessage, newestEpisode } from '../outbox/change';
import { accessEpisode } from './access';
import { requirePermission } from './require';

/**
 * Who may read a message and see to it. One about a patient is for those who plan visits in the patient's unit.
 * A text that is filed under no patient is for coordinators alone, and of those only for who could be concerned:
 *
 * - from a number of several patients: where one of them has an episode in the coordinator's units
 * - from a patient without an episode, or a number of nobody: every coordinator who has a unit
 * - from staff: coordinators of that person's units
 */

export type MessageRow = typeof outbox.$inferSelect;
export type InboundRow = typeof inboundMessages.$inferSelect;

/** Who books visits keeps the contacts, and sees to what a text could not do. */
const PERMISSION = 'visit.plan';

/**
 * A message of ours that did or did not arrive.
 * @throws Problem `not-found` also for what goes to accounts: that is the administrator's, and may carry an invitation
 */
export async function accessMessage(
	reader: Reader,
	person: Person,
	id: string
): Promise<{ message: MessageRow; episodeId: string }> {
	requirePermission(person, PERMISSION);
	const [message] = await reader.select().from(outbox).where(eq(outbox.id, id));
	const episodeId = message ? await episodeOfMessage(reader, message) : null;
	if (!message || message.refKind === 'account' || episodeId === null) {
		throw notFound('message');
	}
	await accessEpisode(reader, person, episodeId, PERMISSION);
	return { message, episodeId };
}

/** A text that came in. @throws Problem `not-found` */
export async function accessInboundText(
	reader: Reader,
	person: Person,
	id: string
): Promise<{ text: InboundRow; episodeId: string | null }> {
	requirePermission(person, PERMISSION);
	const [text] = await reader.select().from(inboundMessages).where(eq(inboundMessages.id, id));
	if (!text) {
		throw notFound('text');
	}
	const episodeId = text.patientId === null ? null : await newestEpisode(reader, text.patientId);
	if (episodeId !== null) {
		await accessEpisode(reader, person, episodeId, PERMISSION);
	} else if (!(await maySeeStray(reader, person, id))) {
		throw notFound('text');
	}
	return { text, episodeId };
}

/** Who hears at once of a text that is filed under no patient: the coordinators who may see to it. */
export async function mayHearStray(reader: Reader, people: Person[], id: string): Promise<Person[]> {
	const may = await Promise.all(people.map((person) => maySeeStray(reader, person, id)));
	return people.filter((_, index) => may[index]);
}

async function maySeeStray(reader: Reader, person: Person, id: string): Promise<boolean> {
	if (!can(person, 'stray-text.settle') || person.unitIds.length === 0) {
		return false;
	}
	const [row] = await reader
		.select({ id: inboundMessages.id })
		.from(inboundMessages)
		.where(and(eq(inboundMessages.id, id), strayIn(person.unitIds)));
	return row !== undefined;
}

/** True in SQL for a text filed under no episode that concerns these units; see above. */
export function strayIn(unitIds: readonly string[]): SQL {
	const units = sql.join(
		unitIds.map((id) => sql`${id}`),
		sql`, `
	);
	const { patientId, userId, fromNumber, understoodAs } = inboundMessages;
	const withNumber = sql`select 1 from patients p join episodes e on e.patient_id = p.id where p.phone = ${fromNumber}`;
	return sql`case
		when ${patientId} is not null
			then not exists (select 1 from episodes e where e.patient_id = ${patientId})
		when ${userId} is not null
			then exists (select 1 from user_units w where w.user_id = ${userId} and w.unit_id in (${units}))
		when ${understoodAs} = 'shared-number'
			then exists (${withNumber} and e.unit_id in (${units})) or not exists (${withNumber})
		else true
	end`;
}
