/**
 * Calculators: pure, unrounded, each naming its source. The zod schemas of their bodies are in `forms.ts`. They
 * estimate for a clinician who decides; none of them is a clinical order.
 */
export { corridorWalk, type CorridorWalk } from './corridor';
export {
	earlyWarning,
	OBSERVATIONS,
	RISKS,
	type EarlyWarning,
	type Observation,
	type Risk
} from './early-warning';
export { energy, ENERGY_RANGES, ML_PER_MET, walkingGradeFor, walkingSpeedFor, type Energy } from './energy';
export type {
	EarlyWarningInput,
	EnergyInput,
	HeartRateTargetInput,
	PressuresInput,
	WalkTestInput
} from './forms';
export {
	heartFailureMaximum,
	heartRateTarget,
	inpatientCeiling,
	MAXIMUM_METHODS,
	METHODS,
	predictedMaximum,
	reservePercent,
	type HeartRateTarget,
	type MaximumMethod
} from './heart-rate-target';
export {
	orthostatic,
	ORTHOSTATIC_CRITERIA,
	type Orthostatic,
	type OrthostaticCriterion
} from './orthostatic';
export { CALCULATORS, type CalculatorEntry } from './rulebook';
export { pressures, productBand, type Pressures } from './pressures';
export { RISK_MARKS, riskClass, type RiskClass, type RiskMark } from './risk';
export {
	BALL_FLOWS_ML_PER_S,
	breathesTooOften,
	breathEstimateMl,
	BREATHS_PER_HOUR_HINT,
	capacityTooSmall,
	DISCHARGE_GOAL_BALLS
} from './spirometer';
export { MEANINGFUL_CHANGES, walkChange, walkTest, type MeaningfulChange, type WalkTest } from './walk-test';
