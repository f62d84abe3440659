import type { FindingGrade, Outcome } from '$lib/domain/bedside/codes';
import type { Finding } from '$lib/domain/bedside/finding';
import { gradeReadAs, outcomeReadAs, type ReadAs } from '$lib/domain/bedside/read-as';
import type { Rhythm, VisitState } from '$lib/domain/core/codes';
import { localDateOf } from '$lib/domain/core/time';
import { postOperativeDay } from '$lib/domain/episodes/post-operative-day';
import type { Precautions, PrecautionsBasis } from '$lib/domain/episodes/precautions';
import type { Nameboard } from '$lib/domain/episodes/views';
import { DOT, shortDay, type Reader } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';

const RHYTHM_WORDS: Record<Rhythm, () => string> = {
	sinus: m.patient_rhythm_sinus,
	'atrial-fibrillation': m.patient_rhythm_atrial_fibrillation,
	paced: m.patient_rhythm_paced,
	other: m.patient_rhythm_other
};

export const VISIT_STATE_WORDS: Record<VisitState, () => string> = {
	planned: m.patient_visit_planned,
	confirmed: m.patient_visit_confirmed,
	attended: m.patient_visit_attended,
	missed: m.patient_visit_missed,
	cancelled: m.patient_visit_cancelled
};

export const OUTCOME_WORDS: Record<ReadAs<Outcome>, () => string> = {
	clear: m.patient_outcome_clear,
	caution: m.patient_outcome_caution,
	stop: m.patient_outcome_stop,
	'do-not-start': m.patient_do_not_start,
	incomplete: m.patient_outcome_incomplete
};

const FINDING_WORDS: Record<ReadAs<FindingGrade>, () => string> = {
	stop: m.patient_finding_stop,
	'do-not-start': m.patient_do_not_start,
	caution: m.patient_finding_caution,
	note: m.patient_finding_note
};

type Read = Pick<Finding, 'grade' | 'reading'>;

/** How a session ended. What must not start was never stopped. */
export function outcomeWords(outcome: Outcome, findings: readonly Read[]): string {
	return OUTCOME_WORDS[outcomeReadAs(outcome, findings)]();
}

/** The grade of a finding. */
export function findingWords(finding: Read): string {
	return FINDING_WORDS[gradeReadAs(finding)]();
}

/** The drug that slows the heart. Not known is said, never left out. */
export function drugWords(betaBlocked: boolean | null): string {
	const drug = { true: m.patient_drug_yes, false: m.patient_drug_no, null: m.patient_drug_unknown };
	return drug[`${betaBlocked}`]();
}

/** That drug and the rhythm: what a pulse must be read with. */
export function heartWords(betaBlocked: boolean | null, rhythm: string | null): string {
	const known = rhythm !== null && rhythm in RHYTHM_WORDS ? RHYTHM_WORDS[rhythm as Rhythm]() : null;
	return `${drugWords(betaBlocked)}${DOT}${known ?? m.patient_rhythm_unknown()}`;
}

/** `day 5`, counted to the present instant, so that a page left open over midnight is right. */
export function dayWords({ operatedAt }: Pick<Nameboard, 'operatedAt'>, { now, zone }: Reader): string {
	if (operatedAt === null) {
		return m.patient_no_operation();
	}
	const day = postOperativeDay(Date.parse(operatedAt), now, zone);
	return day === null ? m.patient_before_operation() : m.patient_day({ day });
}

/** That there are none is said only of an operation that has begun; without one it is not known. */
const NO_PRECAUTIONS: Record<PrecautionsBasis, () => string> = {
	performed: m.patient_no_precautions,
	planned: m.patient_precautions_planned,
	none: m.patient_precautions_unknown
};

/** What to beware of: the precautions with the day on which to ask for their end, and how far the arms may go. */
export function bewareWords(
	{ basis, sternal, endDue, maxElevationDeg }: Precautions,
	reader: Reader
): string[] {
	if (!sternal) {
		return [NO_PRECAUTIONS[basis]()];
	}
	const overdue = endDue !== null && endDue < localDateOf(reader.now, reader.zone);
	const word = overdue ? m.patient_sternal_overdue : m.patient_sternal_due;
	return [
		...(endDue === null ? [] : [word({ day: shortDay(endDue, reader) })]),
		...(maxElevationDeg === null ? [] : [m.patient_arms_to({ degrees: maxElevationDeg })])
	];
}
