import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { Problem, invalidField } from '$lib/domain/core/errors';
import type { passBody } from '$lib/domain/escalations/forms';
import { askHolderAt } from '$lib/domain/escalations/holding';
import { requireEscalationMove } from '$lib/domain/escalations/states';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEscalation } from '../access/access';
import { loadPerson } from '../auth/people';
import type { Context, PersonContext } from '../context';
import type { Tx } from '../db';
import { escalations } from '../db/schema';
import { write, type Change, type Written } from '../write';
import { moved, type Moved } from './follow';
import { accessHeld } from './held';
import { recordMove } from './moves';
import { alert, placeOf, stopAlerts, type EscalationRow } from './tell';

/** Pass it on to a named person. Until they confirm the giver still has it. */
export function passEscalation(
	context: PersonContext,
	id: string,
	input: z.infer<typeof passBody>
): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const row = await accessHeld(tx, context, id, 'pass');
		const receiver = await loadPerson(tx, input.to);
		const where = await placeOf(tx, row.episodeId);
		if (!receiver || receiver.id === context.actor.id || !can(receiver, 'escalation.take', where)) {
			throw invalidField('/to', `to ${input.to} is nobody who could take this escalation.`);
		}
		await tx
			.update(escalations)
			.set({ passTo: receiver.id, passReason: input.reason })
			.where(eq(escalations.id, id));
		await recordMove(tx, context, id, 'passed', { to: receiver.id });
		const body = m.escalations_entry_passed({ name: receiver.name, reason: input.reason });
		return {
			...(await moved(tx, row, 'taken', 'escalation.passed', 'passed', body)),
			messages: [await alert(tx, row, receiver.id, where, `pass:${context.now}`, context.now)]
		};
	});
}

/** The receiver of a pass confirms: from now on they hold it. */
export function confirmPass(context: PersonContext, id: string): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		return confirm(tx, context, context.actor, escalation);
	});
}

/** {@link confirmPass} inside a transaction. The new holder has their own time to be at the bedside. */
export async function confirm(
	tx: Tx,
	context: Context,
	person: Person,
	row: EscalationRow
): Promise<Change<Moved>> {
	requireEscalationMove(row.state, 'confirm');
	if (row.passTo !== person.id) {
		throw new Problem('not-allowed', 'This escalation was not passed to you.');
	}
	const { now } = context;
	await tx
		.update(escalations)
		.set({
			takenBy: person.id,
			takenAt: now,
			arrivedAt: null,
			etaMinutes: null,
			etaGivenAt: null,
			passTo: null,
			passReason: null,
			nextStepAt: null,
			askHolderAt: askHolderAt(row.grade, now, null, row.neededBy),
			holderAskedAt: null
		})
		.where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'confirmed', { from: row.takenBy });
	await stopAlerts(tx, row.id, 'confirmed');
	return moved(tx, row, 'taken', 'escalation.pass-confirmed', 'confirmed', m.escalations_entry_confirmed());
}
