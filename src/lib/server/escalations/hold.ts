import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { AuditAction } from '$lib/domain/audit/actions';
import { can } from '$lib/domain/access/can';
import { Problem, invalidField } from '$lib/domain/core/errors';
import type { passBody, settleBody } from '$lib/domain/escalations/forms';
import { requireEscalationMove, type EscalationMove } from '$lib/domain/escalations/states';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEscalation } from '../access/access';
import { loadPerson } from '../auth/people';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { escalations } from '../db/schema';
import { write, type Change, type Written } from '../write';
import { recordMove } from './moves';
import { alert, placeOf, stopAlerts, type EscalationRow } from './tell';

export interface Moved {
	id: string;
	state: EscalationRow['state'];
}

/** The holder is at the bedside. */
export function arriveAtEscalation(context: PersonContext, id: string): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const row = await accessHeld(tx, context, id, 'arrive');
		await tx.update(escalations).set({ arrivedAt: context.now }).where(eq(escalations.id, id));
		await recordMove(tx, context, id, 'arrived');
		return moved(row, 'taken', 'escalation.arrived', 'arrived', m.escalations_entry_arrived());
	});
}

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
			...moved(row, 'taken', 'escalation.passed', 'passed', body),
			messages: [await alert(tx, row, receiver.id, where, `pass:${context.now}`, context.now)]
		};
	});
}

/** The receiver of a pass confirms: from now on they hold it. */
export function confirmPass(context: PersonContext, id: string): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		return confirm(tx, context, escalation);
	});
}

/** The confirming itself, inside a transaction of the caller's, who has fetched the row with permission. */
export async function confirm(
	tx: Tx,
	context: PersonContext,
	escalation: EscalationRow
): Promise<Change<Moved>> {
	const { id } = escalation;
	requireEscalationMove(escalation.state, 'confirm');
	if (escalation.passTo !== context.actor.id) {
		throw new Problem('not-allowed', 'This escalation was not passed to you.');
	}
	await tx
		.update(escalations)
		.set({
			takenBy: context.actor.id,
			takenAt: context.now,
			arrivedAt: null,
			etaMinutes: null,
			passTo: null,
			passReason: null
		})
		.where(eq(escalations.id, id));
	await recordMove(tx, context, id, 'confirmed');
	await stopAlerts(tx, id, 'confirmed');
	const body = m.escalations_entry_confirmed();
	return moved(escalation, 'taken', 'escalation.pass-confirmed', 'confirmed', body);
}

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
				passTo: null
			})
			.where(eq(escalations.id, id));
		await recordMove(tx, context, id, 'settled', { recheckMinutes: recheckMinutes ?? null });
		const words = [m.escalations_entry_settled({ outcome }), note];
		if (recheckMinutes) {
			words.push(m.escalations_entry_recheck({ minutes: recheckMinutes }));
		}
		return moved(row, 'settled', 'escalation.settled', 'settled', words.join(' '));
	});
}

/** Take back a mistaken call. */
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
		await tx
			.update(escalations)
			.set({
				state: 'withdrawn',
				endedBy: context.actor.id,
				endedAt: context.now,
				note: reason,
				nextStep: null,
				nextStepAt: null
			})
			.where(eq(escalations.id, id));
		await recordMove(tx, context, id, 'withdrawn');
		await stopAlerts(tx, id, 'withdrawn');
		const body = m.escalations_entry_withdrawn({ reason });
		return moved(escalation, 'withdrawn', 'escalation.withdrawn', 'withdrawn', body);
	});
}

/** The row, when this person holds it. */
async function accessHeld(
	tx: Tx,
	context: PersonContext,
	id: string,
	move: EscalationMove
): Promise<EscalationRow> {
	const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
	requireEscalationMove(escalation.state, move);
	if (escalation.takenBy !== context.actor.id) {
		throw new Problem('not-allowed', 'Somebody else holds this escalation.', { state: escalation.state });
	}
	return escalation;
}

function moved(
	row: EscalationRow,
	state: Moved['state'],
	action: AuditAction,
	kind: string,
	body: string
): Change<Moved> {
	const { id, episodeId, threadId } = row;
	return {
		result: { id, state },
		audit: { action, objectKind: 'escalation', objectId: id, episodeId },
		entries: threadId ? [{ threadId, kind: 'answer', body, ref: { kind: 'escalation', id } }] : [],
		events: [{ topic: 'escalation', kind, id, episodeId }]
	};
}
