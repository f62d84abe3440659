import type { Person } from '../access/actor';
import { can } from '../access/can';
import { GRADES, type ClearanceKind, type Grade, type Service } from '../core/codes';

export const LOOSE_END_KINDS = [
	'escalation',
	'escalation-taken',
	'recheck',
	'clearance',
	'referral',
	'visit-cancelled',
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
	/** Service, clearance kind or whatever names the thing more closely. */
	code: string | null;
	text: string | null;
	askedById: string | null;
	askedBy: string | null;
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
	const asked = thing.askedById === person.id ? 'theirs' : null;
	const unit = thing.unitId === null ? {} : { unitId: thing.unitId };
	switch (thing.kind) {
		case 'escalation':
			// Nobody is told of their own call for help; they see that they still wait.
			return asked ?? (can(person, 'escalation.take', unit) ? 'mine' : null);
		case 'escalation-taken':
			return thing.heldById === person.id ? 'mine' : asked;
		case 'recheck':
			return thing.heldById === person.id ? 'mine' : asked;
		case 'clearance':
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
		case 'visit-cancelled':
		case 'message-failed':
			return person.role === 'coordinator' && can(person, 'visit.plan', unit) ? 'mine' : null;
		case 'inbound':
			return can(person, 'stray-text.settle', unit) ? 'mine' : null;
	}
}

/** Most urgent first (untaken escalations, then held ones, then the rest), the oldest first within each. */
export function byUrgency(a: OpenThing, b: OpenThing): number {
	return rank(a) - rank(b) || (a.due ?? a.since) - (b.due ?? b.since) || a.id.localeCompare(b.id);
}

function rank(thing: OpenThing): number {
	const grade = thing.grade === null ? GRADES.length : GRADES.indexOf(thing.grade);
	switch (thing.kind) {
		case 'escalation':
			return grade;
		case 'escalation-taken':
			return 10 + grade;
		case 'recheck':
			return 20;
		case 'clearance':
		case 'referral':
			return thing.text === 'urgent' ? 29 : 30;
		case 'message-failed':
		case 'inbound':
		case 'visit-cancelled':
			return 40;
	}
}
