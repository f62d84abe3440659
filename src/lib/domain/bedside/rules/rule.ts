/** What a response rule is made of, and the facts that all of them look at. */
import type { Activity } from '../activities/activity';
import type { FindingGrade, LimitKey, Moment, RuleId, SymptomCode } from '../codes';
import type { RuleFinding } from '../finding';
import type { ActivityDone, Context } from '../forms';
import type { Limit, LimitSet } from '../limits/limits';
import type { SourceId } from '../limits/sources';
import { DEFAULTS_VERSION } from '../limits/table';
import type { Placed } from '../timeline';

/** Something that was really done, with its entry in the catalogue. */
export interface Done {
	readonly done: ActivityDone;
	readonly activity: Activity;
}

export interface GradedSymptom {
	readonly code: SymptomCode;
	/** 1 to 4, or null where nobody graded it. */
	readonly grade: number | null;
}

/** A session laid out for the rules. */
export interface Facts {
	readonly context: Context;
	readonly limits: LimitSet;
	/** Every reading in order; `before` is the first, `after` the last. */
	readonly readings: readonly Placed[];
	readonly before: Placed;
	readonly during: readonly Placed[];
	readonly after: Placed;
	readonly symptoms: readonly GradedSymptom[];
	readonly activities: readonly Done[];
	/** What findings about the patient as a whole speak of: `before` until anything was measured in effort. */
	readonly stage: Moment;
}

/** One row of the table of response rules. */
export interface Rule {
	readonly id: RuleId;
	/** The rule in words that a clinician can check. */
	readonly words: string;
	/** The sources of a rule without a limit of its own; the limits of a rule name theirs themselves. */
	readonly sources: readonly SourceId[];
	judge(facts: Facts): RuleFinding[];
	/** True when something the rule should have looked at is missing. */
	lacks(facts: Facts): boolean;
}

/** The limit of this name, or null where the set has it switched off. */
export function limitOf({ limits }: Facts, key: LimitKey): Limit | null {
	return limits.limits[key];
}

/** A finding that rests on a limit. */
export function overLimit(
	rule: RuleId,
	grade: FindingGrade,
	reading: Moment,
	measured: number | string | null,
	limit: Limit,
	reason: string
): RuleFinding {
	return {
		rule,
		grade,
		reading,
		measured,
		limit: limit.value,
		unit: limit.unit,
		reason,
		source: limit.source,
		version: limit.version
	};
}

/** A finding about something that has no number. */
export function withoutLimit(
	rule: RuleId,
	grade: FindingGrade,
	reading: Moment,
	measured: string | null,
	reason: string,
	source: string
): RuleFinding {
	return {
		rule,
		grade,
		reading,
		measured,
		limit: null,
		unit: null,
		reason,
		source,
		version: DEFAULTS_VERSION
	};
}

/** How a sentence names a moment of the session. */
export const MOMENT_WORDS: Record<Moment, string> = {
	before: 'before the session',
	during: 'in effort',
	after: 'after effort'
};

/** How a sentence names the way a limit was crossed. */
export const CROSSING_WORDS = { over: 'over', at: 'at or over', under: 'under' } as const;
