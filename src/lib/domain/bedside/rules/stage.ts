/**
 * Stage rules look at effort alone: as the work rises, systolic pressure and heart rate should rise or hold. Each
 * reading in effort is compared with every earlier one taken at less work, so that a fall in several small steps
 * is found as well as a sudden one. Both must be in the same posture and, for the pressure, from the same source.
 * A fall over the limit stops; in the `strict` set 80 % of it already cautions. `work` is any number that grows
 * with effort; readings without it say nothing about rising work and cannot be judged.
 */
import type { RuleId } from '../codes';
import type { RuleFinding } from '../finding';
import { exact, plain } from '../numbers';
import type { Measure, Placed } from '../timeline';
import { changeBetween, comparable, type Change } from './base';
import { gradeChange, limitWords } from './change';
import { limitOf, overLimit, type Facts, type Rule } from './rule';

interface StageRule {
	readonly id: Extract<RuleId, 'systolic-stage-fall' | 'heart-rate-fall'>;
	readonly what: string;
	readonly words: string;
	readonly measure: Measure;
}

const STAGES: readonly StageRule[] = [
	{
		id: 'systolic-stage-fall',
		what: 'systolic pressure',
		words: 'While the work rises, the systolic pressure must not fall.',
		measure: 'sbp'
	},
	{
		id: 'heart-rate-fall',
		what: 'heart rate',
		words: 'While the work rises, the heart rate must not fall.',
		measure: 'hr'
	}
];

/** The rules on rising work, as rows of the registry. */
export const stageRules: readonly Rule[] = STAGES.map((rule) => ({
	id: rule.id,
	words: rule.words,
	sources: [],
	judge: (facts) => judge(rule, facts),
	lacks: (facts) => limitOf(facts, rule.id) !== null && steps(rule, facts).length === 0
}));

function judge(rule: StageRule, facts: Facts): RuleFinding[] {
	const limit = limitOf(facts, rule.id);
	const [steepest] = steps(rule, facts).sort((a, b) => a.rise - b.rise);
	if (limit === null || steepest === undefined) {
		return [];
	}
	const { base, placed, from, to } = steepest;
	const fall = exact(-steepest.rise);
	const grade = gradeChange(facts, limit, fall, 'stop');
	if (grade === null) {
		return [];
	}
	const work = `while the work rose from ${plain(base.reading.work ?? 0)} to ${plain(placed.reading.work ?? 0)}`;
	const course = `The ${rule.what} fell by ${plain(fall)} ${limit.unit}, from ${plain(from)} to ${plain(to)}`;
	const reason = `${course}, ${work}: ${limitWords(facts, limit, fall)}.`;
	return [overLimit(rule.id, grade, 'during', fall, limit, reason)];
}

/** Every comparable pair of readings in effort of which the later was taken at more work. */
function steps({ measure }: StageRule, { during }: Facts): Change[] {
	return during.flatMap((later, index) =>
		during
			.slice(0, index)
			.filter((earlier) => isStep(earlier, later) && comparable(earlier, later, measure))
			.map((earlier) => changeBetween(earlier, later, measure))
			.filter((change) => change !== null)
	);
}

function isStep(earlier: Placed, later: Placed): boolean {
	const [less, more] = [earlier.reading.work, later.reading.work];
	return less != null && more != null && less < more && earlier.posture === later.posture;
}
