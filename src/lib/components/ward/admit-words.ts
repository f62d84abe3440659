import type { Approach, Rhythm, Sex } from '$lib/domain/core/codes';
import type { DrugAnswer } from '$lib/domain/episodes/admit-form';
import { m } from '$lib/i18n/paraglide/messages';

/** The words of the lists that an admission chooses from. */
export const SEX_WORDS: Record<Sex, () => string> = {
	male: m.home_admit_sex_male,
	female: m.home_admit_sex_female,
	other: m.home_admit_sex_other,
	unknown: m.home_admit_not_known
};

export const APPROACH_WORDS: Record<Approach, () => string> = {
	sternotomy: m.home_admit_approach_sternotomy,
	other: m.home_admit_approach_other
};

export const RHYTHM_WORDS: Record<Rhythm, () => string> = {
	sinus: m.home_admit_rhythm_sinus,
	'atrial-fibrillation': m.home_admit_rhythm_fibrillation,
	paced: m.home_admit_rhythm_paced,
	other: m.home_admit_rhythm_other
};

export const DRUG_WORDS: Record<DrugAnswer, () => string> = {
	yes: m.home_admit_drug_yes,
	no: m.home_admit_drug_no,
	unknown: m.home_admit_not_known
};

/** Words as the options of a list, in their order. */
export function options(words: Record<string, () => string>): { value: string; label: string }[] {
	return Object.entries(words).map(([value, label]) => ({ value, label: label() }));
}
