/** The bodies and forms by which a level is decided and a sign-off is given. */
import { z } from 'zod';
import { LEVELS } from '../core/codes';
import { reason, tooLong } from '../core/fields';

const level = z.literal([...LEVELS], 'to is a whole number from 1 to 6.');

/** Move a patient to a level. Against the advice of the last session a reason is needed. */
export const decideLevelBody = z.strictObject({ to: level, reason: reason('reason').optional() });
export type DecideLevel = z.output<typeof decideLevelBody>;

/**
 * The same as a form posts it. A text and no closed list: of a list the first member would be taken where nothing
 * was chosen, and nobody means level 1 by pressing too early.
 */
export const decideLevelForm = z.strictObject({
	to: z.string().regex(/^[1-6]$/, 'Level: choose one from 1 to 6.'),
	reason: z.string().trim().max(1000, tooLong('Reason', 1000)).default('')
});

export const refuseSignOffBody = z.strictObject({ reason: reason('reason') });
/** What a form asks for: which sign-off it is travels beside it, and is not typed. */
export const refuseSignOffForm = z.object({ reason: reason('Reason') });
