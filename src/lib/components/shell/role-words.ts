import type { Role } from '$lib/domain/core/codes';
import { m } from '$lib/i18n/paraglide/messages';

/** The word of each role, as it stands after a name: 'I. Aldous, therapist'. */
export const ROLE_WORDS: Record<Role, () => string> = {
	surgeon: m.common_role_surgeon,
	physician: m.common_role_physician,
	nurse: m.common_role_nurse,
	therapist: m.common_role_therapist,
	'speech-therapist': m.common_role_speech_therapist,
	coordinator: m.common_role_coordinator,
	admin: m.common_role_admin
};
