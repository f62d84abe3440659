import { assess } from '$lib/domain/bedside/assess';
import type { RuleId } from '$lib/domain/bedside/codes';
import type { Finding } from '$lib/domain/bedside/finding';
import type { Assessment } from '$lib/domain/bedside/forms';
import type { ReadingField } from './fields';

/** Where on the page a finding belongs: beside a reading's field, or to one of the other parts. */
export type FindingPlace = ReadingField | 'asked' | 'rhythm' | 'activities' | 'symptoms' | 'missing';

const PLACES: Record<RuleId, FindingPlace> = {
	'systolic-ceiling': 'sbp',
	'systolic-floor': 'sbp',
	'mean-floor': 'dbp',
	'diastolic-ceiling': 'dbp',
	'heart-rate-ceiling': 'hr',
	'heart-rate-floor': 'hr',
	'respiratory-ceiling': 'rr',
	'saturation-floor': 'spo2',
	'exertion-ceiling': 'rpe',
	'pain-ceiling': 'pain',
	'temperature-ceiling': 'asked',
	'start-check': 'asked',
	'systolic-fall': 'sbp',
	'systolic-stage-fall': 'sbp',
	'systolic-rise': 'sbp',
	'heart-rate-rise': 'hr',
	'heart-rate-fall': 'hr',
	'saturation-fall': 'spo2',
	'postural-fall': 'sbp',
	'rhythm-caveat': 'asked',
	symptom: 'symptoms',
	'new-rhythm': 'hr',
	'reading-missing': 'missing',
	'arm-elevation': 'activities',
	'clearance-missing': 'activities',
	'not-following': 'activities',
	airway: 'activities',
	'helper-missing': 'activities',
	'beta-blocker-unknown': 'asked'
};

/** The part of the page that a finding stands in. */
export function placeOf({ rule, reading }: Pick<Finding, 'rule' | 'reading'>): FindingPlace {
	// Before the session there is one answer to what the rhythm is, asked by itself.
	return rule === 'new-rhythm' && reading === 'before' ? 'rhythm' : PLACES[rule];
}

/**
 * Which reading in effort a finding speaks of: the first with which it is there. Null when it speaks of another
 * moment. Judged anew for each reading, so that a finding stands beside the value it is about.
 */
export function duringIndexOf(finding: Finding, input: Assessment): number | null {
	if (finding.reading !== 'during') {
		return null;
	}
	const index = input.during.findIndex((_, last) =>
		assess({ ...input, during: input.during.slice(0, last + 1), after: {} }).findings.some(
			(found) =>
				found.rule === finding.rule && found.grade === finding.grade && found.measured === finding.measured
		)
	);
	return index < 0 ? null : index;
}
