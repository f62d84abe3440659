import { and, eq, isNotNull } from 'drizzle-orm';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import type { LiveEvent } from '$lib/domain/live/events';
import type { Tx } from '../db';
import { escalations, escalationSteps } from '../db/schema';
import { newId } from '../ids';
import type { NewMessage } from '../outbox/enqueue';
import { escalationEvents } from './follow';
import { alert, placeOf, startChain, stopAlerts, type EscalationRow } from './tell';

/** What a move of the patient means for a call that nobody has ended. */
export interface Followed {
	messages: NewMessage[];
	events: LiveEvent[];
}

/**
 * A call for help goes where the patient goes. Messages that name the old bed and have not left are stopped;
 * everybody who was told is told the new place. In another unit the chain starts again, because nobody there has
 * heard of it. Who has it already keeps it, and sees the new place on their page.
 * @param unitIds the unit that the patient left and the one they are in now; one and the same for another bed
 */
export async function followPatient(
	tx: Tx,
	episodeId: string,
	unitIds: { left: string; now: string },
	now: number
): Promise<Followed> {
	const open = await tx.select().from(escalations).where(eq(escalations.episodeId, episodeId));
	const followed: Followed = { messages: [], events: [] };
	for (const row of open.filter(({ state }) => state === 'raised' || state === 'taken')) {
		const events = escalationEvents(row, 'moved');
		for (const unitId of new Set([unitIds.left, unitIds.now])) {
			followed.events.push(...events.map((event) => ({ ...event, unitId })));
		}
		if (row.state === 'raised' || isSoughtAnew(row)) {
			followed.messages.push(...(await tellAgain(tx, row, unitIds.left !== unitIds.now, now)));
		}
	}
	return followed;
}

async function tellAgain(tx: Tx, row: EscalationRow, elsewhere: boolean, now: number): Promise<NewMessage[]> {
	await stopAlerts(tx, row.id, 'the patient was moved');
	const told = await toldOf(tx, row.id);
	const messages = elsewhere ? await startChain(tx, row, 0, now) : [];
	const place = await placeOf(tx, row.episodeId);
	const occasion = `moved:${newId()}`;
	for (const userId of told.filter((id) => !messages.some((message) => message.userId === id))) {
		messages.push(await alert(tx, row, userId, place, occasion, now));
	}
	return messages;
}

async function toldOf(tx: Tx, escalationId: string): Promise<string[]> {
	const rows = await tx
		.selectDistinct({ userId: escalationSteps.userId })
		.from(escalationSteps)
		.where(and(eq(escalationSteps.escalationId, escalationId), isNotNull(escalationSteps.userId)));
	return rows.flatMap(({ userId }) => (userId === null ? [] : [userId]));
}
