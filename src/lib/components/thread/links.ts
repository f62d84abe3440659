import type { RefKind } from '$lib/domain/referrals/entries';
import { m } from '$lib/i18n/paraglide/messages';
import { routes } from '$lib/routes';

/** Where the thing stands that an entry speaks of; null where it is the thread itself. */
export function placeOfRef(
	ref: { kind: RefKind; id: string } | null,
	episodeId: string
): { href: string; label: string } | null {
	switch (ref?.kind) {
		case 'clearance':
			return { href: routes.clearance(episodeId, ref.id), label: m.referrals_see_clearance() };
		case 'session':
			return { href: `${routes.sessions(episodeId)}#${ref.id}`, label: m.referrals_see_session() };
		case 'escalation':
			return { href: routes.escalation(ref.id), label: m.referrals_see_escalation() };
		case 'visit':
			return { href: routes.patientVisits(episodeId), label: m.referrals_see_visits() };
		case 'wound-note':
			return { href: routes.patient(episodeId), label: m.referrals_see_wound() };
		case 'line':
		case 'oxygen-note':
			return { href: routes.patient(episodeId), label: m.referrals_see_lines() };
		case 'referral':
		case undefined:
			return null;
	}
}
