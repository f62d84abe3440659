/** In which order loose ends stand: the most urgent first, the oldest first among equals. */
import { assertNever } from '../core/assert-never';
import { GRADES, type Priority } from '../core/codes';
import type { OpenThing } from './loose-ends';

type Ranked = Pick<OpenThing, 'kind' | 'id' | 'grade' | 'priority' | 'since' | 'due'>;

/**
 * Somebody who calls for help and is not heard, then who is heard and waits, then what was promised after a call,
 * then what was done without leave, then what holds up treatment, then what can be telephoned about. A question in words never makes anything urgent:
 * only its kind, grade and priority do.
 */
const FIRST_RANK = {
	untaken: 0,
	answers: 5,
	taken: 10,
	recheck: 20,
	physician: 25,
	deviation: 27,
	asks: 30,
	messages: 40,
	visits: 50
} as const;
const BY_PRIORITY: Record<Priority, number> = { urgent: 0, soon: 1, routine: 2 };

/** Sorts the most urgent first, then the one that has waited longest; what has a time of its own goes by that. */
export function byUrgency(a: Ranked, b: Ranked): number {
	return rank(a) - rank(b) || timeOf(a) - timeOf(b) || a.id.localeCompare(b.id);
}

/** Lower is more urgent. A clearance and a question have no priority of their own and rank as 'soon'. */
export function rank({ kind, grade, priority }: Pick<Ranked, 'kind' | 'grade' | 'priority'>): number {
	switch (kind) {
		case 'escalation':
			return FIRST_RANK.untaken + gradeRank(grade);
		case 'arrival':
		case 'confirm':
			return FIRST_RANK.answers + gradeRank(grade);
		case 'escalation-taken':
			return FIRST_RANK.taken + gradeRank(grade);
		case 'recheck':
			return FIRST_RANK.recheck;
		case 'physician-to-tell':
			return FIRST_RANK.physician;
		case 'deviation':
			return FIRST_RANK.deviation;
		case 'precautions-due':
			return FIRST_RANK.asks + BY_PRIORITY.routine;
		case 'clearance':
		case 'clearance-question':
		case 'refusal':
		case 'mention':
		case 'sign-off':
		case 'referral':
			return FIRST_RANK.asks + BY_PRIORITY[priority ?? 'soon'];
		case 'message-failed':
		case 'visit-untold':
		case 'inbound':
			return FIRST_RANK.messages;
		case 'visit-cancelled':
		case 'visit-closed-day':
		case 'visit-unmarked':
		case 'visit-unconfirmed':
			return FIRST_RANK.visits;
		default:
			return assertNever(kind);
	}
}

function gradeRank(grade: Ranked['grade']): number {
	return grade === null ? GRADES.length : GRADES.indexOf(grade);
}

const OF_A_VISIT: ReadonlySet<Ranked['kind']> = new Set([
	'visit-cancelled',
	'visit-closed-day',
	'visit-unconfirmed',
	'visit-unmarked'
]);

/** A re-check and a visit come due at a time of their own; everything else has waited since it was asked. */
function timeOf({ kind, since, due }: Ranked): number {
	const hasOwnTime = kind === 'recheck' || OF_A_VISIT.has(kind);
	return hasOwnTime ? (due ?? since) : since;
}
