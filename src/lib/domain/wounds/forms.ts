import { z } from 'zod';
import { text, tooLong } from '../core/fields';
import { STERNUM_FINDINGS, WOUND_FINDINGS } from './codes';

const fields = z.strictObject({
	wound: z.enum(WOUND_FINDINGS, `wound is one of ${WOUND_FINDINGS.join(', ')}.`).optional(),
	sternum: z.enum(STERNUM_FINDINGS, `sternum is one of ${STERNUM_FINDINGS.join(', ')}.`).optional(),
	note: text('note', 500).optional()
});

/** What was seen of the wound and felt of the breastbone; at least one of the three is said. */
export const woundNoteBody = fields.refine(
	({ wound, sternum, note }) => wound !== undefined || sternum !== undefined || note !== undefined,
	'Nothing is noted: give wound, sternum or note.'
);
export type WoundNoteInput = z.infer<typeof woundNoteBody>;

/** The same as a page posts it: what was not looked at is empty. */
export const woundNoteForm = z.strictObject({
	wound: z.enum(['', ...WOUND_FINDINGS], 'Wound: choose one.'),
	sternum: z.enum(['', ...STERNUM_FINDINGS], 'Breastbone, on coughing: choose one.'),
	note: z.string().trim().max(500, tooLong('In words', 500))
});
export type WoundNoteFields = z.infer<typeof woundNoteForm>;

/** What a page posted, without what was not looked at. */
export function woundNoteOf({ wound, sternum, note }: WoundNoteFields): WoundNoteInput {
	return {
		...(wound === '' ? {} : { wound }),
		...(sternum === '' ? {} : { sternum }),
		...(note === '' ? {} : { note })
	};
}
