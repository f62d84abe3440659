import { m } from '$lib/i18n/paraglide/messages';

/** The grades of an escalation, each with its word, alarm colour and shape after IEC 60601-1-8. */
export type GradeName = 'high' | 'medium' | 'low';

export const GRADE_WORDS: Record<GradeName, () => string> = {
	high: m.common_grade_high,
	medium: m.common_grade_medium,
	low: m.common_grade_low
};

/** Class of text in a grade's colour. */
export const GRADE_TEXT: Record<GradeName, string> = {
	high: 'text-high',
	medium: 'text-medium',
	low: 'text-low'
};

/** Class of the ground behind an escalation of a grade. */
export const GRADE_GROUND: Record<GradeName, string> = {
	high: 'bg-high-ground',
	medium: 'bg-medium-ground',
	low: 'bg-low-ground'
};

/** Class of the line along such a ground. */
export const GRADE_EDGE: Record<GradeName, string> = {
	high: 'border-high',
	medium: 'border-medium',
	low: 'border-low'
};
