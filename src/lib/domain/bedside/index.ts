/**
 * The bedside: readings, response rules, activities and levels. Pure; runs in the browser while somebody types
 * and on the server when the session is stored, so that both give the same answer. The zod schemas are in
 * `forms.ts`, apart, so that a page which only judges does not load zod.
 */
export * from './codes';
export * from './bounds';
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
export { ACTIVITY_CODES, type ActivityCode } from './activities/codes';
