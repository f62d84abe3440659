/**
 * A junior stays at the cautious figure; beyond it a senior signs. A dose that was given is on record at once and
 * waits for the signature; a level that a junior proposes beyond the advice holds only once it is signed.
 * Physicians and surgeons answer for themselves. Common practice, no published source.
 */
import type { Person } from '../access/actor';
import type { Level, Role } from '../core/codes';
import type { Advice } from './progress';

export const SIGN_OFF_KINDS = ['level', 'dose'] as const;
export type SignOffKind = (typeof SIGN_OFF_KINDS)[number];

/** `replaced`: somebody decided otherwise before it was signed. */
export const SIGN_OFF_STATES = ['asked', 'signed', 'refused', 'replaced'] as const;
export type SignOffState = (typeof SIGN_OFF_STATES)[number];

/** True for whoever may go beyond the cautious figure, and sign for others who did. */
export function isSenior({ role, senior }: Pick<Person, 'role' | 'senior'>): boolean {
	return role === 'physician' || role === 'surgeon' || senior === true;
}

/** The roles whose accounts are marked: physicians and surgeons need no mark, others treat nobody. */
export const MAY_BE_SENIOR = ['therapist', 'speech-therapist', 'nurse'] as const satisfies readonly Role[];

/** True when the decision needs a senior: more than one level at once, or up against the advice. */
export function seniorSignsLevel(from: Level, to: Level, advice: Pick<Advice, 'suggestion'>): boolean {
	return to > from + 1 || (to > from && advice.suggestion !== 'progress');
}
