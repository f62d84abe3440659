/**
 * The response rules in one call. The same function answers while somebody types at the bedside, for
 * `POST /api/assess`, and when a session is stored.
 */
import { activityByCode } from './activities/activities';
import { FINDING_GRADES, MOMENTS, type Outcome } from './codes';
import type { Finding, Verdict } from './finding';
import type { Assessment, Context, Symptom } from './forms';
import { limitsFor, overrideLimits, setFor, type LimitSet, type LocalLimits } from './limits/limits';
import { withPrescribed } from './limits/prescribed';
import { reasonReadAs } from './read-as';
import { RULES } from './rules/registry';
import type { Facts, GradedSymptom } from './rules/rule';
import { hasValues, placeReadings } from './timeline';

/**
 * Judge a session. `limits` are those of the unit, from `limitsFor`; without them the defaults of the set that
 * the context names. Limits of the patient in `context.limits` and the prescribed range come on top. Never
 * throws on a body that its schema accepts, and never reads anything but its arguments.
 */
export function assess(input: Assessment, limits?: LimitSet): Verdict {
	const facts = gather(input, limits);
	const { set } = facts.limits;
	const findings = RULES.flatMap((rule) => rule.judge(facts))
		.map((found): Finding => ({ ...found, reason: reasonReadAs(found), set }))
		.sort(byGravity);
	return {
		findings,
		outcome: outcomeOf(findings),
		notJudged: RULES.filter((rule) => rule.lacks(facts)).map(({ id }) => id),
		set,
		version: facts.limits.version
	};
}

/** Lay a session out for the rules, with the limits of the patient over those given. */
export function gather(input: Assessment, unit: LimitSet = limitsFor(setFor(input.context))): Facts {
	const limits = limitsOfPatient(input.context, unit);
	const readings = placeReadings(input);
	const [before, after] = [readings.at(0), readings.at(-1)];
	if (before === undefined || after === undefined) {
		throw new Error('A session always has a reading before and one after; placeReadings made none.');
	}
	const begun = input.during.length > 0 || hasValues(input.after);
	return {
		context: input.context,
		limits,
		readings,
		before,
		during: readings.slice(1, -1),
		after,
		symptoms: gravestOfEach(input.symptoms),
		activities: input.activities
			.filter(({ notDone }) => !notDone)
			.map((done) => ({ done, activity: activityByCode(done.code) })),
		stage: begun ? 'during' : 'before'
	};
}

function limitsOfPatient({ limits, prescribed }: Context, unit: LimitSet): LimitSet {
	const { maxElevationDeg, maxLoadKg: _shownOnThePageOnly, ...named } = limits ?? {};
	const overrides: LocalLimits =
		maxElevationDeg === undefined ? named : { 'arm-elevation.cleared': maxElevationDeg, ...named };
	return withPrescribed(overrideLimits(unit, overrides), prescribed);
}

/** One entry for each symptom: named twice, the graver grade counts. */
function gravestOfEach(symptoms: readonly Symptom[]): GradedSymptom[] {
	const found = new Map<GradedSymptom['code'], number | null>();
	for (const symptom of symptoms) {
		const { code, grade } = typeof symptom === 'string' ? { code: symptom, grade: null } : symptom;
		const known = found.get(code) ?? null;
		found.set(code, grade == null || (known !== null && known > grade) ? known : grade);
	}
	return [...found].map(([code, grade]) => ({ code, grade }));
}

/** Stops first, then in the order of the session; the sort keeps the order of the rules within that. */
function byGravity(a: Finding, b: Finding): number {
	const byGrade = FINDING_GRADES.indexOf(a.grade) - FINDING_GRADES.indexOf(b.grade);
	return byGrade || MOMENTS.indexOf(a.reading) - MOMENTS.indexOf(b.reading);
}

function outcomeOf(findings: readonly Finding[]): Outcome {
	if (findings.some(({ grade }) => grade === 'stop')) {
		return 'stop';
	}
	if (findings.some(({ rule }) => rule === 'reading-missing')) {
		return 'incomplete';
	}
	return findings.some(({ grade }) => grade === 'caution') ? 'caution' : 'clear';
}
