/** What limits are called, apart from what is known of their sources. */
import { RULE_IDS, SETS, type LimitKey, type RuleId } from '../domain/bedside/codes';
import { DEFAULT_LIMITS } from '../domain/bedside/limits/table';
import { m } from './paraglide/messages';
import { RULE_NAMES } from './rules';

const MEANINGS: Record<string, () => string> = {
	'': m.home_rules_stop,
	before: m.home_rules_stop_before,
	caution: m.home_rules_caution,
	'before-caution': m.home_rules_caution_before,
	'beta-blocked': m.home_rules_stop_drug,
	systolic: m.home_rules_caution_systolic,
	diastolic: m.home_rules_caution_diastolic,
	cleared: m.home_rules_stop_cleared,
	breathlessness: m.home_rules_stop_breathless
};

/** A limit by itself: its rule, what crossing it means, and in what it is measured. */
export function limitLabel(key: LimitKey): string {
	const unit = SETS.map((set) => DEFAULT_LIMITS[set][key]?.unit).find((each) => each !== undefined) ?? '';
	const what = m.home_rules_limit_label({ what: meaningOf(key), unit });
	return m.limits_label({ rule: RULE_NAMES[ruleOf(key)](), what });
}

function ruleOf(key: LimitKey): RuleId {
	const [bare] = key.split('.');
	const rule = RULE_IDS.find((id) => id === bare);
	if (rule === undefined) {
		throw new Error(`The limit '${key}' is of no rule.`);
	}
	return rule;
}

/** What crossing a limit means. A fall of the saturation never stops by itself; every other bare name of a rule is its stop limit. */
export function meaningOf(key: LimitKey): string {
	const suffix = key === 'saturation-fall' ? 'caution' : (key.split('.')[1] ?? '');
	return MEANINGS[suffix]?.() ?? suffix;
}
