import { ROLE_WORDS } from '$lib/components/shell/role-words';
import { m } from '$lib/i18n/paraglide/messages';
import { env } from '$lib/server/env';
import { DEMO_PASSWORD, emailOf, PEOPLE, SHOWN, type ShownKey } from '$lib/server/setup/demonstration/people';
import type { PageServerLoad } from './$types';

/** What to try as each of them, so that the main job can be walked through from end to end. */
const TRY: Record<ShownKey, () => string> = {
	surgeon: m.account_try_surgeon,
	therapist: m.account_try_therapist,
	nurse: m.account_try_nurse,
	nurse2: m.account_try_nurse2,
	physician: m.account_try_physician,
	speech: m.account_try_speech,
	coordinator: m.account_try_coordinator,
	admin: m.account_try_admin
};

/** The known sign-ins, in demonstration mode only. */
export const load: PageServerLoad = () => {
	if (!env().demo) {
		return { demo: false };
	}
	const signIns = SHOWN.map((key) => ({
		email: emailOf(key),
		role: ROLE_WORDS[PEOPLE[key].role](),
		tryThis: TRY[key]()
	}));
	return { demo: true, signIns, password: DEMO_PASSWORD };
};
