/**
 * Missing readings. A missing value is never a normal one: heart rate and both pressures are needed before and
 * after every session, and what is not there is said. After walking a missing pressure cautions, because that
 * is when a fall would show. In an irregular rhythm, where the pulse says little, exertion is needed too. Each
 * of these findings makes the outcome `incomplete`, unless something stops.
 */
import type { RuleFinding } from '../finding';
import { cite } from '../limits/sources';
import { measured, type Placed } from '../timeline';
import { sessionIsIrregular } from './rhythm';
import { MOMENT_WORDS, withoutLimit, type Facts, type Rule } from './rule';

export const readingMissing: Rule = {
	id: 'reading-missing',
	words:
		'Heart rate and pressure are needed before and after; in an irregular rhythm exertion as well. What is missing is never taken as normal.',
	sources: ['common-practice'],
	judge: (facts) => [
		...missingAt(facts, facts.before),
		...missingAt(facts, facts.after),
		...exertionMissing(facts)
	],
	lacks: () => false
};

function missingAt(facts: Facts, placed: Placed): RuleFinding[] {
	const walked = facts.activities.some(({ activity }) => activity.walking);
	const found: RuleFinding[] = [];
	if (measured(placed, 'hr') === null) {
		found.push(missing(placed, 'heart rate', 'note'));
	}
	if (measured(placed, 'sbp') === null || measured(placed, 'dbp') === null) {
		found.push(missing(placed, 'blood pressure', walked && placed.moment === 'after' ? 'caution' : 'note'));
	}
	return found;
}

function exertionMissing(facts: Facts): RuleFinding[] {
	const { during, after } = facts;
	const asked = [...during, after].some((placed) => measured(placed, 'rpe') !== null);
	return asked || !sessionIsIrregular(facts) ? [] : [missing(after, 'exertion', 'note')];
}

function missing({ moment }: Placed, what: string, grade: 'note' | 'caution'): RuleFinding {
	const reason = `The ${what} ${MOMENT_WORDS[moment]} was not measured. What is missing is not normal.`;
	return withoutLimit('reading-missing', grade, moment, null, reason, cite('common-practice'));
}
