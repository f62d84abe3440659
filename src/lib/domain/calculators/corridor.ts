/**
 * Laps of the corridor to distance, speed and estimated METs. A lap is there and back. Most ward walks are slower
 * than the walking equation was made for: the estimate is then marked, not hidden.
 */
import { energy } from './energy';

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
