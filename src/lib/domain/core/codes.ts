/**
 * The closed lists of the product, declared once. Types, table columns, zod schemas and labels derive from
 * these arrays, so that a new member breaks every place that forgot it. Values are fixed by the JSON API.
 */

export const ROLES = [
	'surgeon',
	'physician',
	'nurse',
	'therapist',
	'speech-therapist',
	'coordinator',
	'admin'
] as const;
export type Role = (typeof ROLES)[number];

/** The roles that treat patients; coordinator and admin do not. */
export const CLINICAL_ROLES = ['surgeon', 'physician', 'nurse', 'therapist', 'speech-therapist'] as const;
export type ClinicalRole = (typeof CLINICAL_ROLES)[number];

export const SERVICES = ['physiotherapy', 'speech-therapy', 'outpatient-programme'] as const;
export type Service = (typeof SERVICES)[number];

export const PRIORITIES = ['routine', 'soon', 'urgent'] as const;
export type Priority = (typeof PRIORITIES)[number];

export const REFERRAL_STATES = ['asked', 'accepted', 'declined', 'closed', 'withdrawn'] as const;
export type ReferralState = (typeof REFERRAL_STATES)[number];

export const CLEARANCE_KINDS = [
	'arm-stage',
	'out-of-bed',
	'corridor',
	'stairs',
	'oral-intake',
	'treadmill',
	'precautions-end',
	'discharge'
] as const;
export type ClearanceKind = (typeof CLEARANCE_KINDS)[number];

export const CLEARANCE_STATES = [
	'asked',
	'given',
	'given-with-limits',
	'withheld',
	'on-hold',
	'withdrawn',
	'lapsed'
] as const;
export type ClearanceState = (typeof CLEARANCE_STATES)[number];

/** Most urgent first: the order of the array is the order on every screen. */
export const GRADES = ['high', 'medium', 'low'] as const;
export type Grade = (typeof GRADES)[number];

export const ESCALATION_STATES = ['raised', 'taken', 'settled', 'withdrawn'] as const;
export type EscalationState = (typeof ESCALATION_STATES)[number];

/** What can happen to an escalation; a line of its history each. */
export const ESCALATION_MOVES = [
	'raised',
	'told-in-person',
	'added',
	'taken',
	'untaken',
	'eta',
	'asked',
	'went-on',
	'out-of-reach',
	'arrived',
	'passed',
	'confirmed',
	'settled',
	'informed',
	'withdrawn'
] as const;
export type EscalationMoveKind = (typeof ESCALATION_MOVES)[number];

export const VISIT_STATES = ['planned', 'confirmed', 'attended', 'missed', 'cancelled'] as const;
export type VisitState = (typeof VISIT_STATES)[number];

export const STRANDS = ['medical', 'nursing', 'therapy', 'patient'] as const;
export type Strand = (typeof STRANDS)[number];

/** Posts of the on-call roster. */
export const POSTS = ['nurse', 'nurse-in-charge', 'physician', 'surgeon'] as const;
export type Post = (typeof POSTS)[number];

export const SEXES = ['male', 'female', 'other', 'unknown'] as const;
export type Sex = (typeof SEXES)[number];

export const RHYTHMS = ['sinus', 'atrial-fibrillation', 'paced', 'other'] as const;
export type Rhythm = (typeof RHYTHMS)[number];

export const APPROACHES = ['sternotomy', 'other'] as const;
export type Approach = (typeof APPROACHES)[number];

/** Why a stay is over. */
export const CLOSE_REASONS = [
	'home',
	'other-hospital',
	'programme-ended',
	'died',
	'entered-in-error'
] as const;
export type CloseReason = (typeof CLOSE_REASONS)[number];

export const LEVELS = [1, 2, 3, 4, 5, 6] as const;
export type Level = (typeof LEVELS)[number];

/** The discipline an entry belongs to follows from its author's role. */
export const STRAND_OF_ROLE: Record<ClinicalRole, Strand> = {
	surgeon: 'medical',
	physician: 'medical',
	nurse: 'nursing',
	therapist: 'therapy',
	'speech-therapist': 'therapy'
};

/** Narrow a string to a member of one of the lists above. */
export function isOneOf<T extends string>(list: readonly T[], value: string): value is T {
	return (list as readonly string[]).includes(value);
}
