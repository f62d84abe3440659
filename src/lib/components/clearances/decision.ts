/** The decision: what is chosen on the page, and the limits that come of it. Used by page and server alike. */
import type { ClearanceLimits } from '$lib/domain/clearances/forms';
import type { ClearanceKind } from '$lib/domain/core/codes';
import { numberOf } from '$lib/domain/core/typed-number';
import { m } from '$lib/i18n/paraglide/messages';
import type { GiveFields } from './decision-forms';

export const LIMIT_CHOICES = ['60', '90', '120', 'one', 'two', 'none'] as const;
export type LimitChoice = (typeof LIMIT_CHOICES)[number];

/** The choices that are in view for a kind, the cautious one first chosen; none for kinds without a usual limit. */
export function choicesOf(kind: ClearanceKind): { choices: LimitChoice[]; chosen: LimitChoice | null } {
	switch (kind) {
		case 'arm-stage':
			// 90 degrees is what holds where no limit is stated: common practice, no published source.
			return { choices: ['60', '90', '120', 'none'], chosen: '90' };
		case 'out-of-bed':
		case 'corridor':
		case 'stairs':
			return { choices: ['one', 'two', 'none'], chosen: 'one' };
		case 'treadmill':
		case 'oral-intake':
		case 'precautions-end':
		case 'discharge':
			return { choices: [], chosen: null };
	}
}

/** What is wrong with a choice for a kind, or null: a limit must be chosen, or none said, where there are choices. */
export function wrongChoice(kind: ClearanceKind, limit: LimitChoice | undefined): string | null {
	const { choices } = choicesOf(kind);
	const fits = limit === undefined ? choices.length === 0 : choices.includes(limit);
	return fits ? null : m.clearances_choose_limit();
}

/** The limits of a clearance from what was chosen; undefined for a clearance without any. */
export function limitsOf(
	fields: Pick<GiveFields, 'limit' | 'maxMinutes' | 'other'>
): ClearanceLimits | undefined {
	const maxMinutes = numberOf(fields.maxMinutes ?? '');
	const limits: ClearanceLimits = {
		...choiceLimits(fields.limit),
		...(maxMinutes === null ? {} : { maxMinutes }),
		...(fields.other === undefined ? {} : { text: fields.other })
	};
	return Object.keys(limits).length === 0 ? undefined : limits;
}

function choiceLimits(choice: LimitChoice | undefined): ClearanceLimits {
	switch (choice) {
		case '60':
		case '90':
		case '120':
			return { maxElevationDeg: Number(choice) };
		case 'one':
		case 'two':
			return { helpers: choice };
		case 'none':
		case undefined:
			return {};
	}
}

/** The form as it opens: the limits in force, or the usual one of the kind. */
export function fieldsOf(
	kind: ClearanceKind,
	limits: ClearanceLimits | null,
	decidedAt: string | null
): Partial<GiveFields> {
	return {
		limit: choiceOf(kind, limits) ?? undefined,
		maxMinutes: limits?.maxMinutes?.toString() ?? '',
		other: limits?.text,
		seen: decidedAt ?? ''
	};
}

function choiceOf(kind: ClearanceKind, limits: ClearanceLimits | null): LimitChoice | null {
	const { choices, chosen } = choicesOf(kind);
	if (limits === null) {
		return chosen;
	}
	// A limit that is none of the choices is not silently made another one: nothing is chosen then.
	const inForce = limits.helpers ?? limits.maxElevationDeg?.toString() ?? 'none';
	return choices.find((choice) => choice === inForce) ?? null;
}

/** The word on a choice. */
export const CHOICE_WORDS: Record<LimitChoice, () => string> = {
	'60': () => m.clearances_choice_degrees({ degrees: 60 }),
	'90': () => m.clearances_choice_degrees({ degrees: 90 }),
	'120': () => m.clearances_choice_degrees({ degrees: 120 }),
	one: m.clearances_choice_one,
	two: m.clearances_choice_two,
	none: m.clearances_choice_none
};

/** What the main action says with a choice made: 'Clear, to 90 degrees'. */
export const CLEAR_WORDS: Record<LimitChoice, () => string> = {
	'60': () => m.clearances_clear_to({ degrees: 60 }),
	'90': () => m.clearances_clear_to({ degrees: 90 }),
	'120': () => m.clearances_clear_to({ degrees: 120 }),
	one: m.clearances_clear_one,
	two: m.clearances_clear_two,
	none: m.clearances_clear_none
};
