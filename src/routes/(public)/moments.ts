import { m } from '$lib/i18n/paraglide/messages';

export interface Moment {
	/** Of its pictures in `static/pictures`, which `npm run screenshots` takes from the product itself. */
	name: string;
	/** What happens there, and what the picture shows to who does not see it. */
	words: () => string;
	shows: () => string;
}

export const MOMENTS = {
	bedside: { name: 'bedside', words: m.common_front_bedside, shows: m.common_front_bedside_alt },
	call: { name: 'call', words: m.common_front_call, shows: m.common_front_call_alt },
	decide: { name: 'decide', words: m.common_front_decide, shows: m.common_front_decide_alt }
} satisfies Record<string, Moment>;
