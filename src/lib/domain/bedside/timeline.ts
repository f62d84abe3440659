/**
 * The readings of a session in the order they were taken, each with the posture, source of pressure and rhythm
 * it really had. What a reading does not state counts as unchanged from the reading before it; what was not
 * stated from the start is taken from the first reading that states it, since nobody said that it changed.
 */
import type { Rhythm } from '../core/codes';
import type { Moment, Posture, PressureSource } from './codes';
import type { Assessment, Reading } from './forms';

/** The values of a reading that rules measure. */
export type Measure = 'hr' | 'sbp' | 'dbp' | 'spo2' | 'rr' | 'rpe' | 'pain';

/** One reading in its place. */
export interface Placed {
	readonly moment: Moment;
	readonly reading: Reading;
	/** Null when no reading of the session states a posture. */
	readonly posture: Posture | null;
	/** Null when no reading of the session states a source. */
	readonly source: PressureSource | null;
	readonly rhythm: Rhythm;
	/** Counts the changes of posture so far: readings with the same number were taken without moving. */
	readonly stay: number;
}

/** All readings of a session: `before`, then `during` in order, then `after`. There are always at least two. */
export function placeReadings({ context, before, during, after }: Assessment): Placed[] {
	const inOrder: { moment: Moment; reading: Reading }[] = [
		{ moment: 'before', reading: before },
		...during.map((reading) => ({ moment: 'during' as const, reading })),
		{ moment: 'after', reading: after }
	];
	const readings = inOrder.map(({ reading }) => reading);
	const postures = carried(readings.map(({ posture }) => posture ?? null));
	const sources = carried(readings.map(({ bpSource }) => bpSource ?? null));
	const rhythms = carried([context.rhythm, ...readings.map(({ rhythm }) => rhythm ?? null)]).slice(1);
	const stays = counted(postures);
	return inOrder.map((placed, index) => ({
		...placed,
		posture: postures[index] ?? null,
		source: sources[index] ?? null,
		rhythm: rhythms[index] ?? context.rhythm,
		stay: stays[index] ?? 0
	}));
}

/** A measured value, or null when it was not measured. */
export function measured(placed: Placed, measure: Measure): number | null {
	return placed.reading[measure] ?? null;
}

/** True when any of the values that rules look at was taken. */
export function hasValues({ hr, sbp, dbp, spo2, rr, rpe, pain }: Reading): boolean {
	return [hr, sbp, dbp, spo2, rr, rpe, pain].some((value) => value != null);
}

/** Fill each gap with the value before it, and gaps at the start with the first value there is. */
function carried<T>(values: readonly (T | null)[]): (T | null)[] {
	let last = values.find((value) => value !== null) ?? null;
	return values.map((value) => (last = value ?? last));
}

function counted(postures: readonly (Posture | null)[]): number[] {
	let stay = 0;
	return postures.map((posture, index) => {
		stay += index > 0 && posture !== postures[index - 1] ? 1 : 0;
		return stay;
	});
}
