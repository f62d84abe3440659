import { CLEARANCE_KINDS, type ClearanceKind } from '../core/codes';

export type Phase = 'inpatient' | 'outpatient';

/** What is permitted step by step in hospital and means nothing to somebody who lives at home. */
const IN_HOSPITAL: readonly ClearanceKind[] = [
	'out-of-bed',
	'corridor',
	'stairs',
	'oral-intake',
	'discharge'
];

/** The kinds of clearance that say something about a patient in that phase, in the order of recovery. */
export function kindsIn(phase: Phase): readonly ClearanceKind[] {
	return phase === 'inpatient'
		? CLEARANCE_KINDS
		: CLEARANCE_KINDS.filter((kind) => !IN_HOSPITAL.includes(kind));
}
