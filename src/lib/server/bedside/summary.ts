import { activityByCode } from '$lib/domain/bedside/activities/activities';
import type { Verdict } from '$lib/domain/bedside/finding';
import type { Reading, SessionBody } from '$lib/domain/bedside/forms';
import { m } from '$lib/i18n/paraglide/messages';

/** One session in the thread: what was done, the readings before and after, what the rules found. */
export function summaryText(input: SessionBody, verdict: Verdict): string {
	const done = input.activities.filter((a) => !a.notDone).map((a) => activityByCode(a.code).name);
	const lines = [
		m.bedside_summary_head({ level: input.level, activities: done.join(', ') || m.bedside_no_activity() }),
		m.bedside_summary_readings({ before: readingText(input.before), after: readingText(input.after) }),
		...verdict.findings.filter((f) => f.grade !== 'note').map((f) => f.reason)
	];
	if (input.deviation) {
		lines.push(m.bedside_summary_deviation({ reason: input.deviation.reason }));
	}
	return lines.join(' ');
}

/** `128/74, pulse 76, saturation 96 %`; what was not measured is left out. */
export function readingText(reading: Reading): string {
	const parts = [
		reading.sbp != null ? `${reading.sbp}/${reading.dbp ?? '–'}` : '',
		reading.hr != null ? m.bedside_pulse({ hr: reading.hr }) : '',
		reading.spo2 != null ? m.bedside_saturation({ spo2: reading.spo2 }) : ''
	].filter((part) => part !== '');
	return parts.join(', ') || m.bedside_not_measured();
}
