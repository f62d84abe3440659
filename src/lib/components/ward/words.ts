import type { EpisodeListItem } from '$lib/domain/episodes/views';
import { shortDay, type Reader } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';

/** What was operated and how long ago: `Bypass, day 4`; what is known of it, or that nothing is. */
export function procedureWords({ procedure, postOpDay }: EpisodeListItem): string {
	if (procedure === null) {
		return m.home_ward_no_operation();
	}
	return postOpDay === null
		? m.home_ward_before_operation({ procedure })
		: m.home_ward_day({ procedure, day: postOpDay });
}

/** What to beware of, most binding first: arms, when to ask about ending it, the drug that slows the heart. */
export function bewareWords({ precautions, betaBlocked }: EpisodeListItem, reader: Reader): string[] {
	const { sternal, maxElevationDeg, endDue } = precautions;
	return [
		sternal && maxElevationDeg !== null ? m.home_ward_arms({ degrees: maxElevationDeg }) : '',
		sternal && endDue !== null ? m.home_ward_precautions({ day: shortDay(endDue, reader) }) : '',
		DRUG[String(betaBlocked)]?.() ?? ''
	].filter((words) => words !== '');
}

/** Not known is judged as given, so it is said. */
const DRUG: Record<string, () => string> = { true: m.home_ward_drug, null: m.home_ward_drug_unknown };

/** Whether somebody has the escalation. */
export function escalationWords({ state, takenBy }: NonNullable<EpisodeListItem['escalation']>): string {
	return state === 'raised' || takenBy === null
		? m.home_ward_escalation_untaken()
		: m.home_ward_escalation_taken({ name: takenBy });
}
