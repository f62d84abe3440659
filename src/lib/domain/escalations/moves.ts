import type { Person } from '../access/actor';
import { can } from '../access/can';
import { isOpenTo, type Held } from './holding';
import type { EscalationMove } from './states';
import type { EscalationView } from './views';

type Facts = Pick<
	EscalationView,
	| 'state'
	| 'grade'
	| 'unitId'
	| 'holder'
	| 'passTo'
	| 'raisedBy'
	| 'otherCallers'
	| 'arrivedAt'
	| 'askedAt'
	| 'next'
	| 'informed'
>;

/**
 * What this person can do about an escalation as it stands, most pressing first; the server decides it once more.
 * Once the holder is at the bedside there is nothing to say about arriving.
 */
export function movesFor(facts: Facts, person: Person): EscalationMove[] {
	const subject = { unitId: facts.unitId };
	const moves: EscalationMove[] = can(person, 'escalation.take', subject) ? takersMoves(facts, person) : [];
	const open = facts.state === 'raised' || facts.state === 'taken';
	const own = facts.raisedBy.id === person.id && facts.otherCallers.length === 0;
	if (open && own && can(person, 'escalation.withdraw', subject)) {
		moves.push('withdraw');
	}
	return moves;
}

function takersMoves(facts: Facts, person: Person): EscalationMove[] {
	const { state, holder, passTo } = facts;
	if (state === 'raised') {
		return ['take'];
	}
	if (state === 'settled') {
		return facts.grade === 'high' && facts.informed === null ? ['inform'] : [];
	}
	if (state !== 'taken') {
		return [];
	}
	if (passTo?.id === person.id) {
		return ['confirm'];
	}
	const anew: EscalationMove[] = isOpenTo(heldOf(facts), person.id) ? ['take'] : [];
	return holder?.id === person.id ? [...anew, ...holdersMoves(facts)] : anew;
}

function holdersMoves({ arrivedAt }: Facts): EscalationMove[] {
	return arrivedAt === null ? ['arrive', 'eta', 'pass', 'settle'] : ['settle', 'pass'];
}

/** The rule about taking anew, asked of a view: a next step beside a holder means that others are sought. */
function heldOf({ state, holder, askedAt, next }: Facts): Held {
	return {
		state,
		takenBy: holder?.id ?? null,
		holderAskedAt: askedAt === null ? null : Date.parse(askedAt),
		nextStepAt: next === null ? null : Date.parse(next.at)
	};
}
