import type { Person } from '../access/actor';
import { can } from '../access/can';
import { type ClearanceKind, type Grade, type Priority, type Service } from '../core/codes';

export const LOOSE_END_KINDS = [
	'escalation',
	'escalation-taken',
	'arrival',
	'confirm',
	'recheck',
	'physician-to-tell',
	'clearance',
	'clearance-question',
	'refusal',
	'deviation',
	'precautions-due',
	'referral',
	'mention',
	'sign-off',
	'visit-cancelled',
	'visit-closed-day',
	'visit-unconfirmed',
	'visit-unmarked',
	'visit-untold',
	'message-failed',
	'inbound'
] as const;
export type LooseEndKind = (typeof LOOSE_END_KINDS)[number];

/** What the one query answers for anything open: who owes whom what, since when, due when. */
export interface OpenThing {
	kind: LooseEndKind;
	id: string;
	episodeId: string | null;
	threadId: string | null;
	unitId: string | null;
	unit: string | null;
	bed: string | null;
	patientName: string | null;
	grade: Grade | null;
	/** Service, clearance kind, the role that a question is put to, or whatever names the thing more closely. */
	code: string | null;
	/** How soon a referral asks for its answer. */
	priority: Priority | null;
	text: string | null;
	askedById: string | null;
	askedBy: string | null;
	/** Who asked the same beside them: their own calls for help were added to this one. */
	alsoAskedByIds: readonly string[];
	heldById: string | null;
	heldBy: string | null;
	since: number;
	due: number | null;
}

/** A loose end as screens and `GET /api/loose-ends` show it. */
export interface LooseEnd {
	kind: LooseEndKind;
	id: string;
	episodeId: string | null;
	threadId: string | null;
	unit: string | null;
	bed: string | null;
	patientName: string | null;
	grade: Grade | null;
	code: string | null;
	priority: Priority | null;
	title: string;
	askedBy: string | null;
	heldBy: string | null;
	since: string;
	due: string | null;
}

export interface LooseEnds {
	mine: LooseEnd[];
	theirs: LooseEnd[];
}

/** Does it wait on this person, does this person wait for it, or is it none of theirs? */
export function whose(thing: OpenThing, person: Person): 'mine' | 'theirs' | null {
	const asks = thing.askedById === person.id || thing.alsoAskedByIds.includes(person.id);
	const asked = asks ? 'theirs' : null;
	const unit = thing.unitId === null ? {} : { unitId: thing.unitId };
	switch (thing.kind) {
		case 'escalation':
			// One that others are sought for has a row of its own for its holder, and for who waits.
			if (thing.heldById !== null && (asked || thing.heldById === person.id)) {
				return null;
			}
			// Nobody is told of their own call for help; they see that they still wait.
			return asked ?? (can(person, 'escalation.take', unit) ? 'mine' : null);
		case 'escalation-taken':
		case 'arrival':
		case 'confirm':
		case 'recheck':
		case 'physician-to-tell':
			return thing.heldById === person.id ? 'mine' : asked;
		case 'clearance-question':
			return thing.heldById === person.id ? 'mine' : asked;
		case 'refusal':
			// Whoever said no has said it with its reason; it waits on nobody but the one who asked.
			return thing.heldById === person.id ? 'mine' : null;
		case 'precautions-due':
			return can(person, 'precautions.review', unit) ? 'mine' : null;
		case 'clearance':
			// Whoever asked back waits for the answer, which is a row of its own.
			if (thing.heldById === person.id) {
				return null;
			}
			// A surgeon who looks at the precautions of a patient puts the question to the surgeons, themselves included.
			if (thing.code === 'precautions-end' && can(person, 'precautions.review', unit)) {
				return 'mine';
			}
			return (
				asked ??
				(can(person, 'clearance.decide', { ...unit, clearanceKind: thing.code as ClearanceKind })
					? 'mine'
					: null)
			);
		case 'deviation':
			return (
				asked ??
				(can(person, 'clearance.decide', { ...unit, clearanceKind: thing.code as ClearanceKind })
					? 'mine'
					: null)
			);
		case 'referral':
			return (
				asked ?? (can(person, 'referral.answer', { ...unit, service: thing.code as Service }) ? 'mine' : null)
			);
		case 'sign-off':
			// A physician may sign as well, but it is put to the seniors of the trade.
			return asked ?? (person.senior === true && can(person, 'sign-off.decide', unit) ? 'mine' : null);
		case 'mention':
			return thing.heldById === person.id ? 'mine' : asked;
		case 'visit-unmarked':
			return (person.role === 'coordinator' || person.role === 'therapist') &&
				can(person, 'visit.attend', unit)
				? 'mine'
				: null;
		case 'visit-cancelled':
		case 'visit-closed-day':
		case 'visit-unconfirmed':
		case 'visit-untold':
		case 'message-failed':
			return person.role === 'coordinator' && can(person, 'visit.plan', unit) ? 'mine' : null;
		case 'inbound':
			return can(person, 'stray-text.settle', unit) ? 'mine' : null;
	}
}
