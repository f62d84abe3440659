/**
 * How a finding and an outcome are read. A stop on the reading before a session bars its start: nothing was begun that
 * could be stopped, so nowhere does it read 'stop'.
 */
import type { FindingGrade, Outcome } from './codes';
import type { Finding } from './finding';

const HEAD = 'Do not start: ';

/** A grade or an outcome as people read it. */
export type ReadAs<T extends FindingGrade | Outcome> = T | 'do-not-start';

/** True for a stop that bars the start. */
export function barsStart({ grade, reading }: Pick<Finding, 'grade' | 'reading'>): boolean {
	return grade === 'stop' && reading === 'before';
}

/** The grade of a finding, as it is read. */
export function gradeReadAs(finding: Pick<Finding, 'grade' | 'reading'>): ReadAs<FindingGrade> {
	return barsStart(finding) ? 'do-not-start' : finding.grade;
}

/** The outcome of a session, as it is read: it stops only what was begun. */
export function outcomeReadAs(
	outcome: Outcome,
	findings: readonly Pick<Finding, 'grade' | 'reading'>[]
): ReadAs<Outcome> {
	const stops = findings.filter(({ grade }) => grade === 'stop');
	return outcome === 'stop' && stops.length > 0 && stops.every(barsStart) ? 'do-not-start' : outcome;
}

/** The reason of a finding, saying by itself that the session must not start. */
export function reasonReadAs(finding: Pick<Finding, 'grade' | 'reading' | 'reason'>): string {
	const { reason } = finding;
	if (!barsStart(finding) || reason.startsWith(HEAD)) {
		return reason;
	}
	return `${HEAD}${reason.slice(0, 1).toLowerCase()}${reason.slice(1)}`;
}

/** The same reason for a place where the grade stands beside it already. */
export function reasonBesideGrade({ reason }: Pick<Finding, 'reason'>): string {
	if (!reason.startsWith(HEAD)) {
		return reason;
	}
	const rest = reason.slice(HEAD.length);
	return `${rest.slice(0, 1).toUpperCase()}${rest.slice(1)}`;
}
