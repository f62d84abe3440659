import { and, asc, eq, inArray } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import { accessEpisode } from '../access/access';
import type { Context } from '../context';
import type { Reader, Tx } from '../db';
import { escalationLinks, escalations } from '../db/schema';
import { newId } from '../ids';
import type { NewMessage } from '../outbox/enqueue';
import type { Change } from '../write';
import { escalationEvents } from './follow';
import { isOutOfReach, seekAnew } from './out-of-reach';
import { alert, placeOf, startChain, stopAlerts, type EscalationRow } from './tell';

/** What a move of the patient means for the calls that nobody has ended. */
export type Followed = Required<Pick<Change<null>, 'messages' | 'events' | 'entries'>> & {
	audit: Change<null>['audit'][];
};

interface Units {
	left: string;
	now: string;
}

/**
 * A call for help goes where the patient goes. Messages that name the old bed and have not left are stopped;
 * everybody who was told is told the new place. In another unit the chain starts again, because nobody there has
 * heard of it. Who has it already keeps it, and sees the new place on their page; one who does not belong there
 * could not, so that others are sought beside them.
 * @param units the unit that the patient left and the one they are in now; one and the same for another bed
 */
export async function followPatient(
	tx: Tx,
	context: Context,
	episodeId: string,
	units: Units
): Promise<Followed> {
	const open = await tx
		.select()
		.from(escalations)
		.where(and(eq(escalations.episodeId, episodeId), inArray(escalations.state, ['raised', 'taken'])));
	const followed: Followed = { messages: [], events: [], entries: [], audit: [] };
	for (const row of open) {
		await followCall(tx, context, row, units, followed);
	}
	return followed;
}

async function followCall(
	tx: Tx,
	context: Context,
	row: EscalationRow,
	units: Units,
	followed: Followed
): Promise<void> {
	const told = await toldOf(tx, row);
	if (told.length > 0) {
		await stopAlerts(tx, row.id, 'the patient was moved');
	}
	const messages: NewMessage[] = [];
	if (await isOutOfReach(tx, row)) {
		const change = await seekAnew(tx, context, row);
		followed.audit.push(change.audit);
		followed.entries.push(...(change.entries ?? []));
		messages.push(...(change.messages ?? []));
	} else if (isUnheard(row) && units.left !== units.now) {
		messages.push(...(await startChain(tx, row, 0, context.now)));
	}
	messages.push(...(await tellPlace(tx, row, told, messages, context.now)));
	followed.messages.push(...messages);
	const events = await escalationEvents(tx, row, 'moved');
	for (const unitId of new Set([units.left, units.now])) {
		followed.events.push(...events.map((event) => ({ ...event, unitId })));
	}
}

/** The new place, to those who were told the old one and have not heard of the new with the chain. */
async function tellPlace(
	tx: Tx,
	row: EscalationRow,
	told: readonly string[],
	heard: readonly NewMessage[],
	now: number
): Promise<NewMessage[]> {
	const place = await placeOf(tx, row.episodeId);
	const occasion = `moved:${newId()}`;
	const messages: NewMessage[] = [];
	for (const userId of told.filter((id) => !heard.some((message) => message.userId === id))) {
		messages.push(await alert(tx, row, userId, place, occasion, now));
	}
	return messages;
}

/**
 * How the call for help about a patient stands that nobody has ended, for whoever moves the patient: that there is
 * one is for all of the unit, as on the strip; who has it and what it is about is not. Null where there is none.
 */
export async function openCallOf(
	db: Reader,
	person: Person,
	episodeId: string
): Promise<Pick<EscalationRow, 'state'> | null> {
	await accessEpisode(db, person, episodeId, 'episode.read');
	const [open] = await db
		.select({ state: escalations.state })
		.from(escalations)
		.where(and(eq(escalations.episodeId, episodeId), inArray(escalations.state, ['raised', 'taken'])))
		.orderBy(asc(escalations.state));
	return open ?? null;
}

/** Nobody has it, or others are sought beside its holder. */
function isUnheard(row: EscalationRow): boolean {
	return row.state === 'raised' || isSoughtAnew(row);
}

/**
 * Who may be on the way to the old place. While nobody comes that is everybody who has a link, whether a step of the
 * chain told them or somebody in person; once somebody has it, the receiver of a pass alone.
 */
async function toldOf(tx: Tx, row: EscalationRow): Promise<string[]> {
	if (!isUnheard(row)) {
		return row.passTo === null ? [] : [row.passTo];
	}
	const rows = await tx
		.selectDistinct({ userId: escalationLinks.userId })
		.from(escalationLinks)
		.where(eq(escalationLinks.escalationId, row.id));
	return rows.map(({ userId }) => userId);
}
