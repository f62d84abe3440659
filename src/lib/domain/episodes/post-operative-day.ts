/** The post-operative day: how far a patient is from the latest operation of the episode. */
import { daysBetween, localDateOf } from '../core/time';
import type { Instant, Zone } from '../core/time';

/**
 * Whole local calendar days since the latest operation, in the hospital's zone: 0 on the day of surgery, `null`
 * on the days before it and without one. A return to theatre starts the count again once it has begun; until
 * then, even on the same day, the operation before it counts.
 */
export function postOperativeDay(
	operatedAt: Instant | null | readonly Instant[],
	now: Instant,
	zone: Zone
): number | null {
	const counted = countedOperation(listOf(operatedAt), now);
	if (counted === null) {
		return null;
	}
	const day = daysBetween(localDateOf(counted, zone), localDateOf(now, zone));
	return day < 0 ? null : day;
}

/** The latest operation that has begun, else the first that is to come. */
function countedOperation(operations: readonly Instant[], now: Instant): Instant | null {
	const begun = operations.filter((at) => at <= now);
	if (begun.length > 0) {
		return Math.max(...begun);
	}
	return operations.length > 0 ? Math.min(...operations) : null;
}

function listOf(operatedAt: Instant | null | readonly Instant[]): readonly Instant[] {
	if (operatedAt === null) {
		return [];
	}
	return typeof operatedAt === 'number' ? [operatedAt] : operatedAt;
}
