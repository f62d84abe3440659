/**
 * Laps of the corridor to distance, speed and estimated METs. A lap is there and back. Most ward walks are slower
 * than the walking equation was made for: the estimate is then marked, not hidden.
 */
import { energy } from './energy';

/** The corridor that laps are counted on where nothing else is said, metres. Common practice, no published source. */
export const WARD_CORRIDOR_M = 50;

export interface CorridorWalk {
	readonly distanceM: number;
	/** m/min; null when no time has passed. */
	readonly speedMPerMin: number | null;
	/** Estimated; null when no time has passed. */
	readonly mets: number | null;
	readonly inRange: boolean;
}

/** Turn counted laps of a corridor of `lengthM` metres, walked in `seconds`, into numbers. `extraM` is the last part lap. */
export function corridorWalk(lengthM: number, laps: number, seconds: number, extraM = 0): CorridorWalk {
	const distanceM = lengthM * 2 * laps + extraM;
	if (seconds <= 0) {
		return { distanceM, speedMPerMin: null, mets: null, inRange: false };
	}
	const speedMPerMin = distanceM / (seconds / 60);
	const { mets, inRange } = energy({ mode: 'walk', speedMPerMin });
	return { distanceM, speedMPerMin, mets, inRange };
}
