import { assertNever } from '$lib/domain/core/assert-never';
import type { ClearanceKind, Role, Service } from '$lib/domain/core/codes';
import { MINUTE } from '$lib/domain/core/time';
import type { HangingEnd } from '$lib/domain/loose-ends/hanging';
import { duration } from '$lib/format';
import { CLEARANCE_WORDS, SERVICE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';
import type { StrandName } from '../rope/strands';
import { ROLE_WORDS } from '../shell/role-words';

/** A loose end as a lane shows it: the strand that owes the answer, and what is open. */
export interface LaneEnd {
	strand: StrandName;
	words: string;
}

/** What is open about one patient, the most urgent first. */
export function laneEnds(ends: readonly HangingEnd[], now: number): LaneEnd[] {
	return ends.map((end) => ({ strand: end.strand, words: endWords(end, now) }));
}

/** What hangs from a lane and for how long: `arm stage asked, 2 h`. Nothing of what anybody wrote. */
export function endWords(end: HangingEnd, now: number): string {
	const open = now - Date.parse(end.since);
	const what = kindWords(end);
	return open < MINUTE
		? what
		: m.home_end_since({ what, time: duration(open < 10 * MINUTE ? wholeMinutes(open) : open) });
}

/** Seconds on sixty lanes would be sixty clocks. */
function wholeMinutes(open: number): number {
	return Math.floor(open / MINUTE) * MINUTE;
}

function kindWords({ kind, code }: Pick<HangingEnd, 'kind' | 'code'>): string {
	const clearance = () => ({ kind: CLEARANCE_WORDS[code as ClearanceKind]().toLowerCase() });
	switch (kind) {
		case 'escalation':
			return m.home_end_escalation();
		case 'escalation-taken':
			return m.home_end_escalation_taken();
		case 'arrival':
			return m.home_end_arrival();
		case 'confirm':
			return m.home_end_confirm();
		case 'recheck':
			return m.home_end_recheck();
		case 'physician-to-tell':
			return m.home_end_physician_to_tell();
		case 'clearance':
			return m.home_end_clearance(clearance());
		case 'clearance-question':
			return m.home_end_clearance_question(clearance());
		case 'refusal':
			return m.home_end_refusal(clearance());
		case 'deviation':
			return m.home_end_deviation(clearance());
		case 'precautions-due':
			return m.home_end_precautions_due();
		case 'referral':
			return m.home_end_referral({ service: SERVICE_WORDS[code as Service]().toLowerCase() });
		case 'mention':
			return m.home_end_mention({ role: ROLE_WORDS[code as Role]() });
		case 'sign-off':
			return m.home_end_sign_off();
		case 'visit-untold':
			return m.home_end_visit_untold();
		case 'visit-cancelled':
			return m.home_end_visit_cancelled();
		case 'visit-closed-day':
			return m.home_end_visit_closed_day();
		case 'visit-unmarked':
			return m.home_end_visit_unmarked();
		case 'visit-unconfirmed':
			return m.home_end_visit_unconfirmed();
		case 'message-failed':
			return m.home_end_message_failed();
		case 'inbound':
			return m.home_end_inbound();
		default:
			return assertNever(kind);
	}
}
