import { eq } from 'drizzle-orm';
import type { AuditAction } from '$lib/domain/audit/actions';
import type { EscalationState } from '$lib/domain/core/codes';
import { isOverEveryScreen } from '$lib/domain/escalations/chain';
import type { LiveEvent } from '$lib/domain/live/events';
import type { EntryKind } from '$lib/domain/referrals/entries';
import type { Reader, Tx } from '../db';
import { escalationFacts, escalations } from '../db/schema';
import type { NewEntry } from '../threads/append';
import type { Change } from '../write';
import type { EscalationRow } from './tell';

export interface Moved {
	id: string;
	state: EscalationState;
}

/** What follows from a move of an escalation: the answer, audit, a line in each of its threads, live events. */
export async function moved(
	tx: Tx,
	row: EscalationRow,
	state: EscalationState,
	action: AuditAction,
	kind: string,
	body: string
): Promise<Change<Moved>> {
	const { id, episodeId } = row;
	return {
		result: { id, state },
		audit: { action, objectKind: 'escalation', objectId: id, episodeId },
		entries: await entriesFor(tx, row, 'answer', body),
		events: await escalationEvents(tx, row, kind)
	};
}

/** The same line for every thread that hears of the escalation: its own, and those of the calls added to it. */
export async function entriesFor(
	tx: Tx,
	{ id, threadId }: Pick<EscalationRow, 'id' | 'threadId'>,
	kind: EntryKind,
	body: string,
	more: Pick<NewEntry, 'strand'> = {}
): Promise<NewEntry[]> {
	const added = await tx
		.selectDistinct({ threadId: escalationFacts.threadId })
		.from(escalationFacts)
		.where(eq(escalationFacts.escalationId, id));
	const all = new Set([threadId, ...added.map((row) => row.threadId)]);
	return [...all].flatMap((thread) =>
		thread === null ? [] : [{ ...more, threadId: thread, kind, body, ref: { kind: 'escalation', id } }]
	);
}

/**
 * Who may read the escalation hears of it; of one that every screen of the unit shows, or has shown, also everybody
 * of the unit. Call it when all of the move is written: a step can have been the last of the chain.
 * @param before how it stood before the move
 */
export async function escalationEvents(
	tx: Tx,
	before: Pick<EscalationRow, 'id' | 'episodeId' | 'grade' | 'nextStep'>,
	kind: string
): Promise<LiveEvent[]> {
	const { id, episodeId } = before;
	const [after = before] = await tx
		.select({ grade: escalations.grade, nextStep: escalations.nextStep })
		.from(escalations)
		.where(eq(escalations.id, id));
	const event: LiveEvent = { topic: 'escalation', kind, id, episodeId };
	const shown = isOverEveryScreen(before) || isOverEveryScreen(after);
	return shown ? [event, { ...event, topic: 'alarm' }] : [event];
}

/** The newest call that set the grade as it stands: its maker is not told of it. */
export async function callerOf(reader: Reader, row: EscalationRow): Promise<string> {
	const raised = await reader
		.select({ byId: escalationFacts.byId, raisedGrade: escalationFacts.raisedGrade })
		.from(escalationFacts)
		.where(eq(escalationFacts.escalationId, row.id))
		.orderBy(escalationFacts.at, escalationFacts.id);
	return raised.findLast((fact) => fact.raisedGrade)?.byId ?? row.raisedBy;
}
