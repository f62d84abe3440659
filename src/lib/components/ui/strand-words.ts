import { m } from '$lib/i18n/paraglide/messages';
import type { StrandName } from '../rope/strands';

/** The word of each discipline. */
export const STRAND_WORDS: Record<StrandName, () => string> = {
	medical: m.common_strand_medical,
	nursing: m.common_strand_nursing,
	therapy: m.common_strand_therapy,
	patient: m.common_strand_patient
};

/** Class of text in a strand's dye. */
export const STRAND_TEXT: Record<StrandName, string> = {
	medical: 'text-woad',
	nursing: 'text-moss',
	therapy: 'text-heather',
	patient: 'text-hemp-ink'
};
