import type { Person } from '../access/actor';
import { can } from '../access/can';
import type { EscalationMove } from './states';
import type { EscalationView } from './views';

type Facts = Pick<EscalationView, 'state' | 'unitId' | 'holder' | 'passTo' | 'raisedBy' | 'arrivedAt'>;

/**
 * What this person can do about an escalation as it stands, most pressing first; the server decides it once more.
 * Once the holder is at the bedside there is nothing to say about arriving.
 */
export function movesFor(facts: Facts, person: Person): EscalationMove[] {
	const subject = { unitId: facts.unitId };
	const moves: EscalationMove[] = can(person, 'escalation.take', subject) ? takersMoves(facts, person) : [];
	const open = facts.state === 'raised' || facts.state === 'taken';
	if (open && facts.raisedBy.id === person.id && can(person, 'escalation.withdraw', subject)) {
		moves.push('withdraw');
	}
	return moves;
}

function takersMoves({ state, holder, passTo, arrivedAt }: Facts, person: Person): EscalationMove[] {
	if (state === 'raised') {
		return ['take'];
	}
	if (state !== 'taken') {
		return [];
	}
	if (passTo?.id === person.id) {
		return ['confirm'];
	}
	if (holder?.id !== person.id) {
		return [];
	}
	return arrivedAt === null ? ['arrive', 'pass', 'settle'] : ['settle', 'pass'];
}
