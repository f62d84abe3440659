import { z } from 'zod';
import { CLEARANCE_KINDS } from '../core/codes';
import { reason, text } from '../core/fields';

/** How far a permission goes. Degrees are arm elevation from the side of the body, 0 down and 180 overhead. */
export const clearanceLimits = z.strictObject({
	maxElevationDeg: z
		.number()
		.min(0, 'maxElevationDeg is at least 0 degrees.')
		.max(180, 'maxElevationDeg is at most 180 degrees.')
		.optional(),
	maxLoadKg: z
		.number()
		.min(0, 'maxLoadKg is at least 0 kg.')
		.max(50, 'maxLoadKg is at most 50 kg.')
		.optional(),
	maxMinutes: z
		.number()
		.int('maxMinutes is a whole number.')
		.min(1, 'maxMinutes is at least 1.')
		.max(240, 'maxMinutes is at most 240.')
		.optional(),
	helpers: z.enum(['one', 'two'], 'helpers is one or two.').optional(),
	text: text('limit', 200).optional()
});
export type ClearanceLimits = z.infer<typeof clearanceLimits>;

export const askClearanceBody = z.strictObject({
	kind: z.enum(CLEARANCE_KINDS),
	question: text('question', 2000),
	threadId: z.string().min(1).optional()
});

export const giveClearanceBody = z.strictObject({
	limits: clearanceLimits.optional(),
	reviewOn: z.iso.date('reviewOn is a date like 2026-12-14.').optional(),
	note: text('note', 1000).optional()
});

export const reasonBody = z.strictObject({ reason: reason('reason') });

/** What the decider is shown, stored with the ask. */
export interface ClearanceEvidence {
	at: string;
	procedure: string | null;
	approach: string | null;
	postOpDay: number | null;
	level: number;
	betaBlocked: boolean | null;
	rhythm: string | null;
	sessions: { id: string; startedAt: string; outcome: string; findings: string[] }[];
}
