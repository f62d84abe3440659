import type { FindingGrade, Moment, Outcome, RuleId, SetName } from './codes';

/** What one rule makes of one moment of a session. Complete in itself: it can be stored and read years later. */
export interface Finding {
	readonly rule: RuleId;
	readonly grade: FindingGrade;
	/** A stop on `before` reads 'do not start', see `read-as.ts`. */
	readonly reading: Moment;
	/** The number measured; the code of a symptom, rhythm or activity; null when it was not measured. */
	readonly measured: number | string | null;
	/** The limit that was used, after unit and patient overrides; null where the rule has none. */
	readonly limit: number | null;
	readonly unit: string | null;
	/** A plain sentence that names what was measured and the limit. */
	readonly reason: string;
	/** The published source, or 'common practice, no published source'. */
	readonly source: string;
	/** The set of limits that judged. */
	readonly set: SetName;
	/** The version of this very limit: of the defaults, or whose change it was and which. */
	readonly version: string;
}

/** A finding as a rule makes it; which set judged is the same for all of them. */
export type RuleFinding = Omit<Finding, 'set'>;

/** The answer of the response rules to one session. */
export interface Verdict {
	/** Gravest first; within a grade in the order of the rules. */
	readonly findings: Finding[];
	readonly outcome: Outcome;
	/** Rules that lacked something they should have looked at. Never read as 'in order'. */
	readonly notJudged: RuleId[];
	/** The set of limits that judged. */
	readonly set: SetName;
	/** The version of that set, with a mark when limits of the unit or the patient were used. */
	readonly version: string;
}
