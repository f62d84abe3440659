/**
 * The three-ball spirometer. Each ball rises at a flow, not at a volume: about 600, 900 and 1200 mL/s (published
 * instructions and a leaflet), and a bench test found more flow at each mark. What is computed from balls and
 * seconds is therefore an estimate and is called one. Breathing deep too often makes light-headed.
 */
export const BALL_FLOWS_ML_PER_S = [600, 900, 1200] as const;

/** More breaths in an hour than this bring on a hint about over-use. From memory, not yet verified. */
export const BREATHS_PER_HOUR_HINT = 20;

/** A vital capacity below this leaves too little to breathe in with, mL per kg. From memory, not yet verified. */
export const LEAST_CAPACITY_ML_PER_KG = 10;

/** The goal by discharge, balls held up. Common practice. */
export const DISCHARGE_GOAL_BALLS = [1.5, 2] as const;

/** Estimated volume of a breath that held up so many balls for so long, mL; null without a ball. */
export function breathEstimateMl(balls: number, seconds: number): number | null {
	const flow = BALL_FLOWS_ML_PER_S[balls - 1];
	return flow === undefined ? null : flow * seconds;
}

/** True when the breaths of one hour call for a hint to rest and breathe normally. */
export function breathesTooOften(breathsInOneHour: number): boolean {
	return breathsInOneHour > BREATHS_PER_HOUR_HINT;
}

/** True when the vital capacity is too small for the device to help. */
export function capacityTooSmall(vitalCapacityMl: number, weightKg: number): boolean {
	return vitalCapacityMl < LEAST_CAPACITY_ML_PER_KG * weightKg;
}
