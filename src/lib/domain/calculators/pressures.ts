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

/** Bands of the rate-pressure product, each from its lower end on: Rate pressure product, Wikipedia. */
export const PRODUCT_BANDS = [
	{ from: 10_000, band: 'low' },
	{ from: 15_000, band: 'low-intermediate' },
	{ from: 20_000, band: 'intermediate' },
	{ from: 25_000, band: 'high-intermediate' },
	{ from: 30_000, band: 'high' }
] as const;

/** The band of a rate-pressure product; null below the lowest. Exactly at an edge belongs to the upper band. */
export function productBand(product: number): (typeof PRODUCT_BANDS)[number]['band'] | null {
	return PRODUCT_BANDS.findLast(({ from }) => product >= from)?.band ?? null;
}

/** A shock index over this raises the risk: Koch 2019. */
export const SHOCK_INDEX_RISK = 1;
