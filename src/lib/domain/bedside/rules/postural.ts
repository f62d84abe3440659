/**
 * Rising to sit or to stand drops the pressure of a patient who lacks volume or whose vessels answer late. The
 * first pressure after rising is compared with the last one before it, from the same source. A fall of 20
 * systolic or 10 diastolic cautions; with any symptom it stops; so does a fall of more than 30 systolic without
 * one. Later readings in the new posture belong to the change rules, once the patient has settled.
 */
import { POSTURES, type LimitKey } from '../codes';
import type { RuleFinding } from '../finding';
import { crosses, type Limit } from '../limits/limits';
import { exact, plain } from '../numbers';
import { measured, type Placed } from '../timeline';
import { changeBetween, comparable } from './base';
import { limitOf, overLimit, type Facts, type Rule } from './rule';

type Pressure = 'sbp' | 'dbp';

const PRESSURE_WORDS: Record<Pressure, string> = { sbp: 'systolic', dbp: 'diastolic' };

export const posturalFall: Rule = {
	id: 'postural-fall',
	words:
		'The first pressure after rising to sit or stand must not have fallen: caution by itself, a stop together with any symptom, and a stop where the systolic fall is large.',
	sources: [],
	judge: (facts) => rises(facts).flatMap((stay) => judgeRise(facts, stay)),
	lacks: (facts) =>
		rises(facts).some(
			(stay) => fallAfter(facts, stay, 'sbp') === null || fallAfter(facts, stay, 'dbp') === null
		)
};

/** The stays, by number, that began with rising from a lower posture. */
function rises({ readings }: Facts): number[] {
	return readings.filter((placed, index) => isRise(readings[index - 1], placed)).map(({ stay }) => stay);
}

function isRise(earlier: Placed | undefined, later: Placed): boolean {
	if (!earlier?.posture || !later.posture) {
		return false;
	}
	return POSTURES.indexOf(later.posture) > POSTURES.indexOf(earlier.posture);
}

interface Fall {
	readonly placed: Placed;
	readonly amount: number;
	readonly from: number;
	readonly to: number;
}

/** The fall from the last pressure before a stay to the first in it; null where one of the two is missing. */
function fallAfter({ readings }: Facts, stay: number, pressure: Pressure): Fall | null {
	const first = readings.find((placed) => placed.stay === stay && measured(placed, pressure) !== null);
	const last =
		first && readings.findLast((placed) => placed.stay === stay - 1 && comparable(placed, first, pressure));
	const change = first && last && changeBetween(last, first, pressure);
	return change ? { placed: first, amount: exact(-change.rise), from: change.from, to: change.to } : null;
}

function judgeRise(facts: Facts, stay: number): RuleFinding[] {
	const systolic = fallAfter(facts, stay, 'sbp');
	const diastolic = fallAfter(facts, stay, 'dbp');
	const found =
		graded(facts, systolic, 'sbp', 'postural-fall', 'stop') ??
		graded(facts, systolic, 'sbp', 'postural-fall.systolic', 'caution') ??
		graded(facts, diastolic, 'dbp', 'postural-fall.diastolic', 'caution');
	return found ? [found] : [];
}

function graded(
	facts: Facts,
	fall: Fall | null,
	pressure: Pressure,
	key: LimitKey,
	alone: 'stop' | 'caution'
): RuleFinding | null {
	const limit = limitOf(facts, key);
	if (fall === null || limit === null || !crosses(limit, fall.amount)) {
		return null;
	}
	const withSymptom = facts.symptoms.length > 0;
	const reason = sentence(fall, pressure, limit, withSymptom && alone === 'caution');
	const grade = withSymptom ? 'stop' : alone;
	return overLimit('postural-fall', grade, fall.placed.moment, fall.amount, limit, reason);
}

function sentence(fall: Fall, pressure: Pressure, limit: Limit, withSymptom: boolean): string {
	const risen = fall.placed.posture === 'standing' ? 'standing up' : 'sitting up';
	const course = `On ${risen} the ${PRESSURE_WORDS[pressure]} pressure fell by ${plain(fall.amount)} ${limit.unit}`;
	const verdict = limit.when === 'at' ? 'which reaches' : 'more than';
	const symptom = withSymptom ? ', and there is a symptom' : '';
	return `${course}, from ${plain(fall.from)} to ${plain(fall.to)}: ${verdict} the limit of ${plain(limit.value)}${symptom}.`;
}
