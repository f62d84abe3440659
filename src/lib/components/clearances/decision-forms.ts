/** The schemas of the decision's forms, apart from its words: a page asks for them once a form is touched. */
import { z } from 'zod';
import { shownMarks } from '$lib/domain/clearances/forms';
import { reason, text, typedDay } from '$lib/domain/core/fields';
import { LIMIT_CHOICES } from './decision';

/** What the decider had in view: the instant of the decision before this one, empty for none. */
const seen = z.string().max(40, 'seen is an instant.').default('');
/** The evidence they had in view; a form without it, kept from before it was asked for, is not held against it. */
const shown = shownMarks.optional();

export const giveForm = z.object({
	limit: z.enum(LIMIT_CHOICES, `limit is one of ${LIMIT_CHOICES.join(', ')}.`).optional(),
	maxMinutes: z
		.number('Minutes: a whole number from 1 to 240.')
		.int('Minutes: a whole number from 1 to 240.')
		.min(1, 'Minutes: at least 1.')
		.max(240, 'Minutes: at most 240.')
		.optional(),
	other: text('Other limit', 200).optional(),
	reviewOn: typedDay('Review date').optional(),
	note: text('Note', 1000).optional(),
	seen,
	shown
});
export type GiveFields = z.infer<typeof giveForm>;

/** For everything that is not a yes: withhold, hold, withdraw. */
export const refuseForm = z.object({ reason: reason('Reason'), seen, shown });
