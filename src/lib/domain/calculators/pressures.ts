/**
 * What follows from heart rate and pressure: mean pressure (en.wikilectures.eu, Mean arterial pressure), pulse
 * pressure, rate-pressure product (a measure of the heart's own oxygen demand; Gobel 1978) and shock index (Koch
 * 2019), which drugs that slow the heart make look better than it is.
 */
import type { PressuresInput } from './forms';

export interface Pressures {
	/** Diastolic plus a third of the pulse pressure, mmHg. */
	readonly map: number;
	/** mmHg. */
	readonly pulsePressure: number;
	/** Beats/min times mmHg. */
	readonly ratePressureProduct: number;
	/** Beats/min per mmHg. */
	readonly shockIndex: number;
}

/** Derive the four from one reading. */
export function pressures({ hr, sbp, dbp }: PressuresInput): Pressures {
	return {
		map: dbp + (sbp - dbp) / 3,
		pulsePressure: sbp - dbp,
		ratePressureProduct: hr * sbp,
		shockIndex: hr / sbp
	};
}
