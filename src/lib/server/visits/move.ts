import { eq } from 'drizzle-orm';
import type { AuditAction } from '$lib/domain/audit/actions';
import type { VisitState } from '$lib/domain/core/codes';
import { invalidField, Problem } from '$lib/domain/core/errors';
import { isExpected, needsReason, visitAfter, whyNot, type VisitMove } from '$lib/domain/visits/states';
import { threadForDeed } from '../access/thread';
import type { Tx } from '../db';
import { visits } from '../db/schema';
import { dropWaiting } from '../outbox/reminders';
import type { Change } from '../write';
import { patientOfEpisode } from './remind';
import { tellCancelled, waysOf, type Way } from './tell-patient';
import { reviveWaiting, rewordReminders } from './waiting-reminders';
import { NOTHING_TO_TELL, startKnown, toBeTold } from './untold';
import { movedText } from './words';

export type VisitRow = typeof visits.$inferSelect;

/** The reason on record when patients cancel themselves and give none. */
export const CANCELLED_BY_PATIENT = 'patient';

const ACTIONS: Record<VisitMove, AuditAction> = {
	confirm: 'visit.confirmed',
	cancel: 'visit.cancelled',
	attend: 'visit.attended',
	miss: 'visit.missed',
	reopen: 'visit.reopened'
};

export interface MovedVisit {
	id: string;
	state: VisitState;
	/** The ways by which the patient hears of a cancellation by staff; none where somebody has to call. */
	told?: Way[];
}

/**
 * Move a visit on, with what follows from it in the same transaction: reminders of a visit that is not expected
 * any more are dropped and come back with it, those of a confirmed one stop asking, and a visit that the patient cancelled stays open
 * until somebody has followed it up. Whether the caller may do it is decided before.
 * @param way how patients said it, where it was them
 * @throws Problem `wrong-state`, and `invalid` where what is on record would be changed without a reason
 */
export async function moveVisit(
	tx: Tx,
	visit: VisitRow,
	move: VisitMove,
	by: 'staff' | 'patient',
	now: number,
	reason: string | null = null,
	way: 'text' | 'page' = 'text'
): Promise<Change<MovedVisit>> {
	const state = visitAfter(visit.state, move);
	if (state === null) {
		throw new Problem('wrong-state', whyNot(visit.state, move), { state: visit.state });
	}
	if (reason === null && needsReason(visit.state, move)) {
		throw invalidField('/reason', `reason is missing: the visit is ${visit.state} on record.`);
	}
	const { id, episodeId } = visit;
	const known = await startKnown(tx, visit);
	const after = { ...visit, ...moved(visit, state, by, now, reason), ...whatToTell(move, by, now, known) };
	await tx.update(visits).set(after).where(eq(visits.id, id));
	const dropped = isExpected(state) ? [] : await dropWaiting(tx, id, `visit ${state}`);
	const patient = await patientOfEpisode(tx, episodeId);
	if (state === 'confirmed') {
		await rewordReminders(tx, patient, id);
	}
	const revived = move === 'reopen' ? await reviveWaiting(tx, patient, after, now) : [];
	const messages = state === 'cancelled' ? tellCancelled(after, by, patient, now) : [];
	const threadId = await threadForDeed(tx, episodeId, null);
	const body = movedText(visit, move, by === 'staff' ? by : way, reason, now);
	const strand = by === 'patient' ? ({ strand: 'patient' } as const) : {};
	return {
		result: { id, state, ...(state === 'cancelled' && by === 'staff' ? { told: waysOf(messages) } : {}) },
		audit: {
			action: ACTIONS[move],
			objectKind: 'visit',
			objectId: id,
			episodeId,
			detail: { by, from: visit.state, ...(by === 'patient' ? { way } : {}) }
		},
		entries: threadId ? [{ threadId, kind: 'event', body, ref: { kind: 'visit', id }, ...strand }] : [],
		events: [{ topic: 'visit', kind: state, id, episodeId }, ...dropped, ...revived],
		messages
	};
}

/** A patient who confirms or cancels knows; of a cancellation by staff they have to hear, unless it is past. */
function whatToTell(move: VisitMove, by: 'staff' | 'patient', now: number, known: number) {
	if (move === 'cancel' && by === 'staff' && known > now) {
		return toBeTold(now, known);
	}
	return move === 'cancel' || move === 'confirm' ? NOTHING_TO_TELL : {};
}

/** What changes in the row. A cancellation is a change that calendars have to hear of, so it raises the sequence. */
function moved(
	{ sequence }: VisitRow,
	state: VisitState,
	by: 'staff' | 'patient',
	now: number,
	reason: string | null
): Partial<VisitRow> {
	const cancelled = state === 'cancelled';
	const byPatient = cancelled && by === 'patient';
	return {
		state,
		decidedAt: now,
		reason: byPatient ? (reason ?? CANCELLED_BY_PATIENT) : reason,
		patientCancelledAt: byPatient ? now : null,
		sequence: cancelled ? sequence + 1 : sequence
	};
}
