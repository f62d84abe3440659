/**
 * Change rules compare each reading in effort and after it with its base (`base.ts`). A change over its limit
 * stops. In the `strict` set a change of 80 % of the limit or more already cautions. The fall of the oxygen
 * saturation only ever cautions, at its limit. On a rate-slowing drug, or when nobody knows whether one is
 * taken, the heart rate may rise less. In atrial fibrillation, pacing or another irregular rhythm a rise of the
 * heart rate says little, so that it cautions at most; `rhythm.ts` adds the note that says why.
 */
import type { FindingGrade, LimitKey, RuleId } from '../codes';
import type { RuleFinding } from '../finding';
import { crosses, type Limit } from '../limits/limits';
import { exact, plain } from '../numbers';
import { measured, type Measure, type Placed } from '../timeline';
import { barAt, type Bar } from './bar';
import { changeSinceBase, settlesAnew, type Change } from './base';
import { isIrregular } from './rhythm';
import { limitOf, MOMENT_WORDS, overLimit, type Facts, type Rule } from './rule';

interface ChangeRule {
	readonly id: RuleId;
	readonly what: string;
	readonly words: string;
	readonly measure: Measure;
	readonly direction: 'fall' | 'rise';
	readonly limit: (facts: Facts) => LimitKey;
	/** The gravest the rule can be for this reading. */
	readonly gravest: (placed: Placed) => 'stop' | 'caution';
}

const CHANGES: readonly ChangeRule[] = [
	{
		id: 'systolic-fall',
		what: 'systolic pressure',
		words: 'The systolic pressure must not fall below its base.',
		measure: 'sbp',
		direction: 'fall',
		limit: () => 'systolic-fall',
		gravest: () => 'stop'
	},
	{
		id: 'systolic-rise',
		what: 'systolic pressure',
		words: 'The systolic pressure must not rise too far above its base.',
		measure: 'sbp',
		direction: 'rise',
		limit: () => 'systolic-rise',
		gravest: () => 'stop'
	},
	{
		id: 'heart-rate-rise',
		what: 'heart rate',
		words:
			'The heart rate must not rise too far above its base, and less far on a rate-slowing drug or when nobody knows whether one is taken. In an irregular or paced rhythm it cautions at most.',
		measure: 'hr',
		direction: 'rise',
		limit: ({ context }) =>
			context.betaBlocked === false ? 'heart-rate-rise' : 'heart-rate-rise.beta-blocked',
		gravest: (placed) => (isIrregular(placed.rhythm) ? 'caution' : 'stop')
	},
	{
		id: 'saturation-fall',
		what: 'oxygen saturation',
		words: 'A fall of the oxygen saturation below its base is a reason for caution.',
		measure: 'spo2',
		direction: 'fall',
		limit: () => 'saturation-fall',
		gravest: () => 'caution'
	}
];

/** The change rules against the base, as rows of the registry. */
export const changeRules: readonly Rule[] = CHANGES.map((rule) => ({
	id: rule.id,
	words: rule.words,
	sources: [],
	judge: (facts) => [...worst(rule, facts, facts.during), ...worst(rule, facts, [facts.after])],
	lacks: (facts) => lacks(rule, facts)
}));

/**
 * The grade of a change of this size, or null. `gravest` is the grade over the limit. A limit that already means
 * caution ('at') has no earlier one.
 */
export function gradeChange(
	{ limits }: Facts,
	limit: Limit,
	amount: number,
	gravest: 'stop' | 'caution'
): FindingGrade | null {
	if (crosses(limit, amount)) {
		return gravest;
	}
	const early = limit.when === 'over' && limits.cautionShare !== null;
	return early && exact(amount) >= cautionFrom(limit, limits.cautionShare) ? 'caution' : null;
}

/** How a change stands to its limit, for a sentence. */
export function limitWords({ limits }: Facts, limit: Limit, amount: number): string {
	const bar = `the limit of ${plain(limit.value)}`;
	if (crosses(limit, amount)) {
		return limit.when === 'at' ? `which reaches ${bar}` : `more than ${bar}`;
	}
	return `near ${bar}, with caution from ${plain(cautionFrom(limit, limits.cautionShare))}`;
}

function cautionFrom(limit: Limit, share: number | null): number {
	return exact(limit.value * (share ?? 1));
}

/** The limits that judged how one value of one reading had changed, counted from its base. */
export function changeBars(facts: Facts, placed: Placed, measure: Measure): Bar[] {
	const change = placed.moment === 'before' ? null : changeSinceBase(facts, placed, measure);
	return CHANGES.filter((rule) => change !== null && rule.measure === measure).flatMap((rule) => {
		const limit = limitOf(facts, rule.limit(facts));
		const up = rule.direction === 'rise';
		const at = (amount: number) => (change?.from ?? 0) + (up ? amount : -amount);
		if (limit === null) {
			return [];
		}
		const early = limit.when === 'over' && facts.limits.cautionShare !== null;
		return [
			barAt(rule.gravest(placed), at(limit.value), up, limit.when === 'at'),
			...(early ? [barAt('caution', at(cautionFrom(limit, facts.limits.cautionShare)), up, true)] : [])
		];
	});
}

/** One finding at most for readings of one moment: of the gravest grade the greatest change. */
function worst(rule: ChangeRule, facts: Facts, readings: readonly Placed[]): RuleFinding[] {
	const limit = limitOf(facts, rule.limit(facts));
	if (limit === null) {
		return [];
	}
	const changes = readings
		.map((placed) => changeSinceBase(facts, placed, rule.measure))
		.filter((change) => change !== null)
		.sort((a, b) => amountOf(rule, b) - amountOf(rule, a));
	const graded = changes.map((change) => ({
		change,
		grade: gradeChange(facts, limit, amountOf(rule, change), rule.gravest(change.placed))
	}));
	const found = graded.find(({ grade }) => grade === 'stop') ?? graded.find(({ grade }) => grade !== null);
	return found?.grade ? [toFinding(rule, facts, limit, found.change, found.grade)] : [];
}

function amountOf({ direction }: ChangeRule, { rise }: Change): number {
	return direction === 'rise' ? rise : -rise;
}

function toFinding(
	rule: ChangeRule,
	facts: Facts,
	limit: Limit,
	change: Change,
	grade: FindingGrade
): RuleFinding {
	const { placed, base, from, to } = change;
	const amount = amountOf(rule, change);
	const course = `The ${rule.what} ${rule.direction === 'fall' ? 'fell' : 'rose'} by ${plain(amount)} ${limit.unit}`;
	const start = base.moment === 'before' ? MOMENT_WORDS.before : `at rest ${base.posture ?? ''}`.trimEnd();
	const span = `from ${plain(from)} ${start} to ${plain(to)} ${MOMENT_WORDS[placed.moment]}`;
	const reason = `${course}, ${span}: ${limitWords(facts, limit, amount)}.`;
	return overLimit(rule.id, grade, placed.moment, amount, limit, reason);
}

/** Switched off is no lack. Otherwise the end must have been compared, and so must every value taken in effort. */
function lacks(rule: ChangeRule, facts: Facts): boolean {
	if (limitOf(facts, rule.limit(facts)) === null) {
		return false;
	}
	const uncompared = (placed: Placed) => changeSinceBase(facts, placed, rule.measure) === null;
	const inEffort = facts.during.filter(
		(placed) => measured(placed, rule.measure) !== null && !settlesAnew(placed)
	);
	return (
		measured(facts.before, rule.measure) === null || uncompared(facts.after) || inEffort.some(uncompared)
	);
}
