/**
 * The bedside: readings, response rules, activities and levels. Pure; runs in the browser while somebody types
 * and on the server when the session is stored, so that both give the same answer. The zod schemas are in
 * `forms.ts`, apart, so that a page which only judges does not load zod.
 */
export * from './codes';
export * from './bounds';
export { assess } from './assess';
export type { Finding, Verdict } from './finding';
export type {
	ActivityDone,
	Assessment,
	ClearanceInForce,
	Context,
	Deviation,
	LimitsOverride,
	Prescribed,
	Reading,
	SessionBody,
	Symptom
} from './forms';
export {
	limitsFor,
	overrideLimits,
	setFor,
	type Limit,
	type LimitSet,
	type LocalLimit,
	type LocalLimits
} from './limits/limits';
export { cite, SOURCES, type Source, type SourceId, type SourceStatus } from './limits/sources';
export { ACTIVITIES, activitiesUpTo, activityByCode } from './activities/activities';
export type { Activity, Dose } from './activities/activity';
export { ACTIVITY_CODES, type ActivityCode } from './activities/codes';
export { granted, lackingClearance, CLEARANCE_WORDS, type Granted } from './rules/clearances';
export * from './levels';
export { doseNotes, seniorSignsDose, type DoseNote } from './doses';
export {
	adviseLevel,
	afterDecision,
	PROGRESS_SYSTOLIC_RISE,
	type Advice,
	type Levels,
	type ProgressReason,
	type Suggestion
} from './progress';
export { seniorSignsLevel } from './sign-off';
export { CALM_HOURS_BEFORE_WALKING, readyToWalk, type Readiness, type WalkingChecks } from './readiness';
export { rulebook, type Rulebook, type RulebookLimit, type RulebookRow } from './rulebook';
