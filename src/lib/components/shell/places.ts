import type { IconDrawing } from '$lib/components/ui/icon';
import BedDouble from '@lucide/svelte/icons/bed-double';
import BookOpen from '@lucide/svelte/icons/book-open';
import CalendarDays from '@lucide/svelte/icons/calendar-days';
import CalendarOff from '@lucide/svelte/icons/calendar-off';
import ListChecks from '@lucide/svelte/icons/list-checks';
import Mail from '@lucide/svelte/icons/mail';
import PhoneCall from '@lucide/svelte/icons/phone-call';
import Ruler from '@lucide/svelte/icons/ruler';
import Smartphone from '@lucide/svelte/icons/smartphone';
import UserRound from '@lucide/svelte/icons/user-round';
import UsersRound from '@lucide/svelte/icons/users-round';
import type { Role } from '$lib/domain/core/codes';
import { m } from '$lib/i18n/paraglide/messages';
import { routes } from '$lib/routes';

/** A place of the navigation. `under` says which paths count as being in it. */
export type Place = {
	key: PlaceKey;
	href: string;
	label: string;
	icon: IconDrawing;
	under: readonly string[];
};
export type PlaceKey =
	| 'loose-ends'
	| 'ward'
	| 'visits'
	| 'cover'
	| 'rules'
	| 'account'
	| 'accounts'
	| 'limits'
	| 'closed-days'
	| 'messages'
	| 'phones';

/**
 * The places of everyday work; a phone shows these three and 'More'. An administrator sees no patients, and so
 * has other work.
 */
export function mainPlaces(role: Role): Place[] {
	if (role === 'admin') {
		return [
			place('loose-ends', routes.looseEnds(), m.common_place_loose_ends()),
			place('accounts', routes.adminAccounts(), m.common_place_accounts()),
			place('account', routes.account(), m.common_place_account())
		];
	}
	return [
		place('loose-ends', routes.looseEnds(), m.common_place_loose_ends(), ['/escalations']),
		place('ward', routes.ward(), m.common_place_ward(), ['/patients', '/bedside']),
		place('visits', routes.visits(), m.common_place_visits())
	];
}

/** The places behind 'More': what everybody has, what an administrator has, what a demonstration has. */
export function morePlaces(role: Role, demo: boolean): Place[] {
	return [
		place('rules', routes.rules(), m.common_place_rules()),
		...(role === 'admin'
			? [
					place('limits', routes.adminLimits(), m.common_place_limits()),
					place('closed-days', routes.closedDays(), m.common_place_closed_days()),
					place('messages', routes.adminMessages(), m.common_place_messages())
				]
			: []),
		...(role === 'admin' ? [] : [place('account', routes.account(), m.common_place_account())]),
		...(demo ? [place('phones', routes.phones(), m.common_place_phones())] : [])
	];
}

/** The roster; at a desk it stands beside the main places, on a phone behind 'More'. */
export function coverPlace(): Place {
	return place('cover', routes.cover(), m.common_place_cover());
}

/** Whether somebody who is at `path` is in the place. */
export function isIn(place: Place, path: string): boolean {
	return place.under.some((root) => path === root || path.startsWith(`${root}/`));
}

/** One drawing for each place, always beside its word. */
const ICONS: Record<PlaceKey, IconDrawing> = {
	'loose-ends': ListChecks,
	ward: BedDouble,
	visits: CalendarDays,
	cover: PhoneCall,
	rules: BookOpen,
	account: UserRound,
	accounts: UsersRound,
	'closed-days': CalendarOff,
	limits: Ruler,
	messages: Mail,
	phones: Smartphone
};

function place(key: PlaceKey, href: string, label: string, also: readonly string[] = []): Place {
	return { key, href, label, icon: ICONS[key], under: [href, ...also] };
}
