/**
 * Which reading a change is measured from. The base is the reading before the session, or, once the patient has
 * changed posture, the first later reading marked `settled` in the new posture. Only readings in the same posture
 * are compared, and pressures only when they come from the same source (cuff or arterial line). A posture keeps
 * the first base it has: a later, lower resting value must not hide a fall. A reading that does not state its
 * posture counts as unchanged and is never left unjudged for that: where its posture has no base yet, the latest base
 * of all is used, so that a fall is rather heard twice than not at all.
 */
import { exact } from '../numbers';
import { measured, type Measure, type Placed } from '../timeline';
import type { Facts } from './rule';

/** A reading, the base it is compared with, and how far it lies above (negative: below) that base. */
export interface Change {
	readonly placed: Placed;
	readonly base: Placed;
	readonly from: number;
	readonly to: number;
	readonly rise: number;
}

/** How a value changed against its base, or null where it was not measured or has nothing to stand beside. */
export function changeSinceBase(facts: Facts, placed: Placed, measure: Measure): Change | null {
	const base = baseFor(facts, placed, measure);
	return base && changeBetween(base, placed, measure);
}

/** How a value changed from one reading to another, or null where one of them lacks it. */
export function changeBetween(base: Placed, placed: Placed, measure: Measure): Change | null {
	const [from, to] = [measured(base, measure), measured(placed, measure)];
	return from === null || to === null ? null : { placed, base, from, to, rise: exact(to - from) };
}

/** True when both have the value and it may be compared: pressures need the same source. */
export function comparable(one: Placed, other: Placed, measure: Measure): boolean {
	const isPressure = measure === 'sbp' || measure === 'dbp';
	return measured(one, measure) !== null && (!isPressure || one.source === other.source);
}

/** True for a reading that becomes a base of its own: settled, and the posture has changed since the start. */
export function settlesAnew({ reading, stay }: Placed): boolean {
	return reading.settled === true && stay > 0;
}

/** The base of a reading for one measure, or null when there is none it may be compared with. */
export function baseFor({ readings }: Facts, placed: Placed, measure: Measure): Placed | null {
	const bases = readings
		.slice(0, readings.indexOf(placed))
		.filter((earlier) => earlier.moment === 'before' || settlesAnew(earlier))
		.filter((earlier) => comparable(earlier, placed, measure));
	const samePosture = bases.find(({ posture }) => posture === placed.posture);
	const unstated = placed.reading.posture == null ? bases.at(-1) : undefined;
	return samePosture ?? unstated ?? null;
}
