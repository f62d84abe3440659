import type { RuleId } from './codes';

/**
 * Rules that speak of what is done or planned, not of how the patient answers to it. Their stop means 'not this';
 * nobody has to sit the patient down or run for it.
 */
const DEED_RULES: readonly RuleId[] = [
	'clearance-missing',
	'arm-elevation',
	'not-following',
	'airway',
	'helper-missing'
];

/** True when the rule is about the deed. */
export function isAboutTheDeed(rule: RuleId): boolean {
	return DEED_RULES.includes(rule);
}
