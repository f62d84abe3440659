import { activityByCode } from '$lib/domain/bedside/activities/activities';
import type { Phase } from '$lib/domain/bedside/codes';
import type { Verdict } from '$lib/domain/bedside/finding';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { CLEARANCE_WORDS } from '$lib/i18n/labels';
import { readingText } from '$lib/i18n/readings';
import { stoodWords } from '$lib/i18n/standing';
import { m } from '$lib/i18n/paraglide/messages';
import type { Lacking } from './deviations';

/**
 * One session in the thread: what was done, the readings before and after, what the rules found.
 * @param phase the one on record, which judged it
 */
export function summaryText(
	input: SessionBody,
	verdict: Verdict,
	lacking: readonly Lacking[],
	phase: Phase
): string {
	const done = input.activities.filter((a) => !a.notDone).map((a) => activityByCode(a.code).name);
	const lines = [
		m.bedside_summary_head({ level: input.level, activities: done.join(', ') || m.bedside_no_activity() }),
		m.bedside_summary_readings({ before: readingText(input.before), after: readingText(input.after) }),
		...verdict.findings.filter((f) => f.grade !== 'note').map((f) => f.reason)
	];
	if (input.deviation) {
		lines.push(deviationText(input.deviation.reason, lacking));
	}
	const said = input.context.phase;
	if (said && said !== phase) {
		lines.push(m.bedside_summary_phase({ said: PHASE_WORDS[said](), phase: PHASE_WORDS[phase]() }));
	}
	return lines.join(' ');
}

const PHASE_WORDS: Record<Phase, () => string> = {
	inpatient: m.bedside_phase_inpatient,
	outpatient: m.bedside_phase_outpatient
};

/** Which clearance was missing and how it stood, so that whoever put it on hold reads that it was not kept. */
function deviationText(reason: string, lacking: readonly Lacking[]): string {
	const stood = lacking.map(({ kind, stood }) => `${CLEARANCE_WORDS[kind]()}: ${stoodWords(stood)}`);
	return stood.length > 0
		? m.bedside_summary_deviation_from({ stood: stood.join('; '), reason })
		: m.bedside_summary_deviation({ reason });
}
