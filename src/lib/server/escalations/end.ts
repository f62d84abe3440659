import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import { Problem } from '$lib/domain/core/errors';
import type { settleBody } from '$lib/domain/escalations/forms';
import { requireEscalationMove } from '$lib/domain/escalations/states';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEscalation } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { escalations } from '../db/schema';
import { write, type Written } from '../write';
import { otherCallersOf } from './added';
import { moved, type Moved } from './follow';
import { accessHeld, NOTHING_AWAITED } from './held';
import { recordMove } from './moves';
import { stopAlerts, type EscalationRow } from './tell';

/** The holder settles it: what came of it, whom they informed, and whether to measure again. */
export function settleEscalation(
	context: PersonContext,
	id: string,
	input: z.infer<typeof settleBody>
): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const row = await accessHeld(tx, context, id, 'settle');
		const { outcome, note, informed, recheckMinutes } = input;
		await tx
			.update(escalations)
			.set({
				state: 'settled',
				endedBy: context.actor.id,
				endedAt: context.now,
				outcome,
				note,
				informed: informed ?? null,
				recheckDueAt: recheckMinutes ? context.now + recheckMinutes * 60_000 : null,
				...NOTHING_AWAITED
			})
			.where(eq(escalations.id, id));
		await recordMove(tx, context, id, 'settled', { recheckMinutes: recheckMinutes ?? null });
		await stopAlerts(tx, id, 'settled');
		const words = [m.escalations_entry_settled({ outcome }), note];
		if (recheckMinutes) {
			words.push(m.escalations_entry_recheck({ minutes: recheckMinutes }));
		}
		return moved(tx, row, 'settled', 'escalation.settled', 'settled', words.join(' '));
	});
}

/** Say afterwards which physician knows of a settled one: the loose end that a nurse's settling left. */
export function informOfEscalation(
	context: PersonContext,
	id: string,
	informed: string
): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		requireEscalationMove(escalation.state, 'inform');
		if (escalation.informed !== null) {
			throw new Problem('wrong-state', `${escalation.informed} is on record as informed.`, {
				state: escalation.state
			});
		}
		await tx.update(escalations).set({ informed }).where(eq(escalations.id, id));
		await recordMove(tx, context, id, 'informed');
		const body = m.escalations_entry_informed({ name: informed });
		return moved(tx, escalation, 'settled', 'escalation.informed', 'informed', body);
	});
}

/**
 * Take back a mistaken call.
 * @throws Problem `wrong-state` naming the others whose own calls were added to it: only settling ends those
 */
export function withdrawEscalation(
	context: PersonContext,
	id: string,
	reason: string
): Promise<Written<Moved>> {
	return write(context, 'escalation.withdraw', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.withdraw');
		if (escalation.raisedBy !== context.actor.id) {
			throw new Problem('not-allowed', 'Only the person who raised an escalation can withdraw it.');
		}
		requireEscalationMove(escalation.state, 'withdraw');
		await requireNoOtherCaller(tx, escalation);
		await tx
			.update(escalations)
			.set({
				state: 'withdrawn',
				endedBy: context.actor.id,
				endedAt: context.now,
				note: reason,
				...NOTHING_AWAITED
			})
			.where(eq(escalations.id, id));
		await recordMove(tx, context, id, 'withdrawn');
		await stopAlerts(tx, id, 'withdrawn');
		const body = m.escalations_entry_withdrawn({ reason });
		return moved(tx, escalation, 'withdrawn', 'escalation.withdrawn', 'withdrawn', body);
	});
}

/** Whoever called into it was told that help is coming: the first caller's mistake does not end their call. */
async function requireNoOtherCaller(tx: Tx, row: EscalationRow): Promise<void> {
	const callers = await otherCallersOf(tx, row);
	if (callers.length > 0) {
		const names = callers.map(({ name }) => name).join(', ');
		const detail = `${names} called for help in the same escalation. It can be settled, but not withdrawn.`;
		throw new Problem('wrong-state', detail, { state: row.state, callers });
	}
}
