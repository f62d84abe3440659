/** The decision: what is chosen on the page, and the limits that come of it. Used by page and server alike. */
import { figuresIn } from '$lib/domain/clearances/figures';
import type { ClearanceLimits } from '$lib/domain/clearances/forms';
import type { ClearanceView } from '$lib/domain/clearances/views';
import type { ClearanceKind } from '$lib/domain/core/codes';
import { numberOf } from '$lib/domain/core/typed-number';
import { limitWords } from '$lib/i18n/limits';
import { m } from '$lib/i18n/paraglide/messages';
import type { GiveFields } from './decision-forms';

export const LIMIT_CHOICES = ['60', '90', '120', 'one', 'two', 'stated', 'none'] as const;
export type LimitChoice = (typeof LIMIT_CHOICES)[number];

/** What of a clearance the choices depend on. */
export type About = Pick<ClearanceView, 'kind' | 'question' | 'proposed' | 'limits' | 'decidedAt'>;

/** The usual limits of a kind; none for kinds without one. */
export function usualChoices(kind: ClearanceKind): LimitChoice[] {
	switch (kind) {
		case 'arm-stage':
			return ['60', '90', '120'];
		case 'out-of-bed':
		case 'corridor':
		case 'stairs':
			return ['one', 'two'];
		case 'treadmill':
		case 'oral-intake':
		case 'precautions-end':
		case 'discharge':
			return [];
	}
}

/**
 * The choices that are in view. A kind without a usual limit has none, unless the ask proposes limits or names a
 * figure in its words: then a yes without a limit is a choice of its own, and never the first one.
 */
export function choicesOf({ kind, question, proposed, limits }: About): LimitChoice[] {
	const usual = usualChoices(kind);
	if (usual.length > 0) {
		return [...usual, 'none'];
	}
	const named = proposed !== null || limits !== null || figuresIn(question).length > 0;
	return named ? ['stated', 'none'] : [];
}

/** What is wrong with what was chosen, or null: a limit must be chosen, or none said, where there are choices. */
export function wrongChoice(about: About, fields: LimitFields): string | null {
	const choices = choicesOf(about);
	const { limit } = fields;
	const fits = limit === undefined ? choices.length === 0 : choices.includes(limit);
	if (!fits) {
		return m.clearances_choose_limit();
	}
	return limit === 'stated' && limitsOf(fields) === undefined ? m.clearances_state_limit() : null;
}

/** What an ask can propose for a kind with usual limits; no limit is none proposed, and takes a choice back. */
export function proposable(kind: ClearanceKind): LimitChoice[] {
	const usual = usualChoices(kind);
	return usual.length > 0 ? [...usual, 'none'] : [];
}

/** What is wrong with what an ask proposes, or null. */
export function wrongProposal(kind: ClearanceKind, limit: LimitChoice | undefined): string | null {
	return limit === undefined || proposable(kind).includes(limit) ? null : m.clearances_choose_limit();
}

export type LimitFields = Pick<GiveFields, 'limit' | 'maxMinutes' | 'other'>;

/**
 * The limits from what was chosen; undefined for none.
 * @param choices those that were in view: where they offered limits in words, "no limit" leaves the words out
 */
export function limitsOf(
	fields: LimitFields,
	choices: readonly LimitChoice[] = []
): ClearanceLimits | undefined {
	if (fields.limit === 'none' && choices.includes('stated')) {
		return undefined;
	}
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
		case 'stated':
		case 'none':
		case undefined:
			return {};
	}
}

/**
 * The form as it opens: the limits in force, else those that the ask proposes. What nobody has said is not chosen; a
 * figure that the ask names in its words alone is offered in words, and whether it is a limit has to be chosen.
 */
export function fieldsOf(about: About): Partial<GiveFields> {
	const { decidedAt, proposed, question } = about;
	const limits = decidedAt === null ? proposed : about.limits;
	const choices = choicesOf(about);
	const figures =
		limits === null && decidedAt === null && choices.includes('stated') ? figuresIn(question) : [];
	return {
		limit: choiceOf(choices, limits, decidedAt !== null),
		maxMinutes: about.kind === 'treadmill' ? (limits?.maxMinutes?.toString() ?? '') : '',
		other: [...restWords(about.kind, limits), ...figures].join(', ').slice(0, 200) || undefined,
		seen: decidedAt ?? ''
	};
}

/** What the form has no field of its own for, in words: a limit that stands must not fall out of the next one. */
function restWords(kind: ClearanceKind, limits: ClearanceLimits | null): string[] {
	if (limits === null) {
		return [];
	}
	const usual: readonly string[] = usualChoices(kind);
	const { maxElevationDeg, helpers, maxMinutes, ...rest } = limits;
	return limitWords({
		...rest,
		...(usual.includes(`${maxElevationDeg}`) ? {} : { maxElevationDeg }),
		...(helpers !== undefined && usual.includes(helpers) ? {} : { helpers }),
		...(kind === 'treadmill' ? {} : { maxMinutes })
	});
}

function choiceOf(
	choices: readonly LimitChoice[],
	limits: ClearanceLimits | null,
	decided: boolean
): LimitChoice | undefined {
	if (choices.includes('stated')) {
		return limits !== null ? 'stated' : decided ? 'none' : undefined;
	}
	// A limit that is none of the choices is not silently made another one: nothing is chosen then.
	const stands = limits?.helpers ?? limits?.maxElevationDeg?.toString() ?? (decided ? 'none' : undefined);
	return choices.find((choice) => choice === stands);
}

/** The word on a choice. */
export const CHOICE_WORDS: Record<LimitChoice, () => string> = {
	'60': () => m.clearances_choice_degrees({ degrees: 60 }),
	'90': () => m.clearances_choice_degrees({ degrees: 90 }),
	'120': () => m.clearances_choice_degrees({ degrees: 120 }),
	one: m.clearances_choice_one,
	two: m.clearances_choice_two,
	stated: m.clearances_choice_stated,
	none: m.clearances_choice_none
};

/** What the main action says with a choice made: 'Clear, to 90 degrees'. */
export const CLEAR_WORDS: Record<LimitChoice, () => string> = {
	'60': () => m.clearances_clear_to({ degrees: 60 }),
	'90': () => m.clearances_clear_to({ degrees: 90 }),
	'120': () => m.clearances_clear_to({ degrees: 120 }),
	one: m.clearances_clear_one,
	two: m.clearances_clear_two,
	stated: m.clearances_clear_stated,
	none: m.clearances_clear_none
};
