import type { ClearanceKind, Service } from '$lib/domain/core/codes';
import { assertNever } from '$lib/domain/core/assert-never';
import type { OpenThing } from '$lib/domain/loose-ends/loose-ends';
import { CLEARANCE_WORDS, SERVICE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';

/** The one line that names an open thing. It is shown behind the sign-in only. */
export function titleOf(thing: OpenThing): string {
	const text = thing.text ?? '';
	switch (thing.kind) {
		case 'escalation':
		case 'escalation-taken':
			return m.home_title_escalation({ text });
		case 'arrival':
			return m.home_title_arrival({ text });
		case 'confirm':
			return m.home_title_confirm({ text });
		case 'physician-to-tell':
			return m.home_title_physician_to_tell({ text });
		case 'recheck':
			return m.home_title_recheck();
		case 'clearance':
			return m.home_title_clearance({ kind: CLEARANCE_WORDS[thing.code as ClearanceKind](), text });
		case 'clearance-question':
			return m.home_title_clearance_question({
				kind: CLEARANCE_WORDS[thing.code as ClearanceKind](),
				text
			});
		case 'refusal':
			return m.home_title_refusal({ kind: CLEARANCE_WORDS[thing.code as ClearanceKind](), text });
		case 'deviation':
			return m.home_title_deviation({ kind: CLEARANCE_WORDS[thing.code as ClearanceKind](), text });
		case 'precautions-due':
			return m.home_title_precautions_due();
		case 'referral':
			return m.home_title_referral({ service: SERVICE_WORDS[thing.code as Service](), text });
		case 'sign-off':
			return m.home_title_sign_off({ text });
		case 'mention':
			return m.home_title_mention({ text });
		case 'visit-unconfirmed':
			return m.home_title_visit_unconfirmed();
		case 'visit-closed-day':
			return m.home_title_visit_closed_day({ name: text });
		case 'visit-unmarked':
			return m.home_title_visit_unmarked();
		case 'visit-untold':
			return thing.code === 'cancelled' ? m.home_title_untold_cancelled() : m.home_title_untold_moved();
		case 'visit-cancelled':
			return m.home_title_visit_cancelled();
		case 'message-failed':
			return m.home_title_message_failed();
		case 'inbound':
			return m.home_title_inbound();
		default:
			return assertNever(thing.kind);
	}
}
