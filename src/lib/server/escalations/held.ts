import type { Person } from '$lib/domain/access/actor';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { requireEscalationMove, type EscalationMove } from '$lib/domain/escalations/states';
import { accessEscalation } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import type { EscalationRow } from './tell';

/** The row, when this person holds it. */
export async function accessHeld(
	tx: Tx,
	context: PersonContext,
	id: string,
	move: EscalationMove
): Promise<EscalationRow> {
	const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
	requireHeld(escalation, context.actor, move);
	return escalation;
}

function requireHeld(row: EscalationRow, person: Person, move: EscalationMove): void {
	requireEscalationMove(row.state, move);
	if (row.takenBy !== person.id) {
		throw new Problem('not-allowed', 'Somebody else holds this escalation.', { state: row.state });
	}
}

/** The history says once when the holder came, and nobody who stands at the bedside is asked whether they do. */
export function requireOnTheWay(row: EscalationRow, person: Person, move: EscalationMove): void {
	requireHeld(row, person, move);
	if (row.arrivedAt !== null) {
		throw new Problem('wrong-state', `You are at the bedside since ${toRfc3339(row.arrivedAt)}.`, {
			state: row.state,
			arrivedAt: toRfc3339(row.arrivedAt)
		});
	}
}

/** Neither is the holder asked, nor does the chain go on. */
export const NOBODY_SOUGHT = { askHolderAt: null, holderAskedAt: null, nextStepAt: null };

/** What a call that is over still waits for: nobody who might confirm it, and no step of its chain. */
export const NOTHING_AWAITED = { ...NOBODY_SOUGHT, passTo: null, passReason: null, nextStep: null };
