import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { passBody, settleBody } from '$lib/domain/escalations/forms';
import { askHolderAt, isSoughtAnew } from '$lib/domain/escalations/holding';
import { requireEscalationMove, type EscalationMove } from '$lib/domain/escalations/states';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEscalation } from '../access/access';
import { loadPerson } from '../auth/people';
import type { Context, PersonContext } from '../context';
import type { Tx } from '../db';
import { escalations } from '../db/schema';
import { write, type Change, type Written } from '../write';
import { otherCallersOf } from './added';
import { moved, type Moved } from './follow';
import { recordMove } from './moves';
import { alert, placeOf, stopAlerts, type EscalationRow } from './tell';

/** The holder is at the bedside. */
export function arriveAtEscalation(context: PersonContext, id: string): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		return arrive(tx, context, context.actor, escalation);
	});
}

/**
 * {@link arriveAtEscalation} inside a transaction. Nobody is asked or sought any more: somebody is there.
 * @throws Problem `wrong-state` for who is there already
 */
export async function arrive(
	tx: Tx,
	context: Context,
	person: Person,
	row: EscalationRow
): Promise<Change<Moved>> {
	requireOnTheWay(row, person, 'arrive');
	await tx
		.update(escalations)
		.set({ arrivedAt: context.now, ...NOBODY_SOUGHT })
		.where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'arrived');
	await stopAlerts(tx, row.id, 'at the bedside');
	return moved(tx, row, 'taken', 'escalation.arrived', 'arrived', m.escalations_entry_arrived());
}

/** In how many minutes the holder will be at the bedside: given after taking, or given anew. */
export function giveEtaOf(context: PersonContext, id: string, minutes: number): Promise<Written<Moved>> {
	return write(context, 'escalation.take', async (tx) => {
		const { escalation } = await accessEscalation(tx, context.actor, id, 'escalation.take');
		return giveEta(tx, context, context.actor, escalation, minutes);
	});
}

/**
 * {@link giveEtaOf} inside a transaction. A holder who was asked has answered with it, as long as the chain has
 * not gone on; from then on only being there, or another taker, stops it.
 */
export async function giveEta(
	tx: Tx,
	context: Context,
	person: Person,
	row: EscalationRow,
	minutes: number
): Promise<Change<Moved>> {
	requireOnTheWay(row, person, 'eta');
	const { now } = context;
	const timers = isSoughtAnew(row)
		? {}
		: { askHolderAt: askHolderAt(row.grade, now, minutes), holderAskedAt: null };
	await tx
		.update(escalations)
		.set({ etaMinutes: minutes, etaGivenAt: now, ...timers })
		.where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'eta', { etaMinutes: minutes });
	return moved(tx, row, 'taken', 'escalation.eta-given', 'eta', m.escalations_entry_eta({ minutes }));
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
			askHolderAt: askHolderAt(row.grade, now, null),
			holderAskedAt: null
		})
		.where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'confirmed', { from: row.takenBy });
	await stopAlerts(tx, row.id, 'confirmed');
	return moved(tx, row, 'taken', 'escalation.pass-confirmed', 'confirmed', m.escalations_entry_confirmed());
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
				passTo: null,
				nextStep: null,
				...NOBODY_SOUGHT
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
				nextStep: null,
				...NOBODY_SOUGHT
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

/** The row, when this person holds it. */
async function accessHeld(
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
function requireOnTheWay(row: EscalationRow, person: Person, move: EscalationMove): void {
	requireHeld(row, person, move);
	if (row.arrivedAt !== null) {
		throw new Problem('wrong-state', `You are at the bedside since ${toRfc3339(row.arrivedAt)}.`, {
			state: row.state,
			arrivedAt: toRfc3339(row.arrivedAt)
		});
	}
}

/** Neither is the holder asked, nor does the chain go on. */
const NOBODY_SOUGHT = { askHolderAt: null, holderAskedAt: null, nextStepAt: null };
