import { m } from '$lib/i18n/paraglide/messages';

/** The word of each kind of unit. */
export const UNIT_WORDS: Record<'intensive-care' | 'ward' | 'gym', () => string> = {
	'intensive-care': m.account_unit_intensive_care,
	ward: m.account_unit_ward,
	gym: m.account_unit_gym
};
