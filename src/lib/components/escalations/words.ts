import type { Grade } from '$lib/domain/core/codes';
import { m } from '$lib/i18n/paraglide/messages';

/** What a grade asks of whoever reads it. */
export const NEED_WORDS: Record<Grade, () => string> = {
	high: m.escalations_need_high,
	medium: m.escalations_need_medium,
	low: m.escalations_need_low
};
