/** The schemas of the decision's forms, apart from its words: a page asks for them once a form is touched. */
import { z } from 'zod';
import { askClearanceBody, shownMarks } from '$lib/domain/clearances/forms';
import { reason, text, tooLong, typedDay, typedNumber } from '$lib/domain/core/fields';
import { m } from '$lib/i18n/paraglide/messages';
import { LIMIT_CHOICES } from './decision';

/** What the decider had in view: the instant of the decision before this one, empty for none. */
const seen = z.string().max(40, tooLong('What was in view', 40)).default('');
/** The evidence they had in view; a form without it, kept from before it was asked for, is not held against it. */
const shown = shownMarks.optional();

export const giveForm = z.object({
	limit: z.enum(LIMIT_CHOICES, m.clearances_choose_limit()).optional(),
	maxMinutes: typedNumber(m.clearances_field_minutes(), { low: 1, high: 240, whole: true }).optional(),
	other: text(m.clearances_field_other(), 200).optional(),
	reviewOn: typedDay(m.clearances_field_review()).optional(),
	note: text(m.clearances_field_note(), 1000).optional(),
	seen,
	shown
});
export type GiveFields = z.infer<typeof giveForm>;

/** The form that asks, with the limits that whoever asks proposes. */
export const askForm = askClearanceBody.omit({ proposed: true }).extend({
	question: text('What you ask', 2000),
	limit: giveForm.shape.limit,
	maxMinutes: giveForm.shape.maxMinutes,
	other: text(m.clearances_ask_limits(), 200).optional()
});

/** For everything that is not a yes: withhold, hold, withdraw. */
export const refuseForm = z.object({ reason: reason(m.clearances_field_reason()), seen, shown });

/** For what is one press: whoever asked has seen the no. */
export const noFields = z.object({});
