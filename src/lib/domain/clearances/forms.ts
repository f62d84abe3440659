import { z } from 'zod';
import type { Outcome } from '../bedside/codes';
import { instant } from '../bedside/form-fields';
import type { ReadAs } from '../bedside/read-as';
import { CLEARANCE_KINDS, type EscalationState, type Grade } from '../core/codes';
import { reason, text } from '../core/fields';
import type { Precautions } from '../episodes/precautions';
import type { LineKind } from '../lines/codes';
import type { SaidOxygen } from '../lines/views';
import type { StandingWound } from '../wounds/stand';

/** How far a permission goes. Degrees are arm elevation from the side of the body, 0 down and 180 overhead. */
export const clearanceLimits = z.strictObject({
	maxElevationDeg: z
		.number()
		.min(0, 'The arm elevation is at least 0 degrees.')
		.max(180, 'The arm elevation is at most 180 degrees.')
		.optional(),
	maxLoadKg: z.number().min(0, 'The load is at least 0 kg.').max(50, 'The load is at most 50 kg.').optional(),
	maxMinutes: z
		.number()
		.int('The time is a whole number of minutes.')
		.min(1, 'The time is at least 1 minute.')
		.max(240, 'The time is at most 240 minutes.')
		.optional(),
	helpers: z.enum(['one', 'two'], 'The number of helpers is one or two.').optional(),
	text: text('The limit', 200).optional()
});
export type ClearanceLimits = z.infer<typeof clearanceLimits>;

export const askClearanceBody = z.strictObject({
	kind: z.enum(CLEARANCE_KINDS),
	question: text('The question', 2000),
	/** The limits that whoever asks proposes; the decision begins with them. */
	proposed: clearanceLimits.optional(),
	threadId: z.string().min(1).optional()
});

/** What the decider was shown, from `shown` of the clearance: when something is new since, it is refused once. */
export const shownMarks = z
	.string()
	.max(20_000, 'shown is at most 20000 characters, as the clearance gave it.');

/**
 * The decision that the decider goes from, from `decidedAt` of the clearance; null for none. When another has come
 * between, theirs is refused. Needed to give with other limits what was given already.
 */
const decidedAt = instant('decidedAt').nullable().optional();

export const giveClearanceBody = z.strictObject({
	/** Null says that there is none: where limits were proposed, leaving them out is refused. */
	limits: clearanceLimits.nullable().optional(),
	reviewOn: z.iso.date('The review day is a date like 2026-12-14.').optional(),
	note: text('The note', 1000).optional(),
	shown: shownMarks.optional(),
	decidedAt
});

export const reasonBody = z.strictObject({ reason: reason('The reason') });

/** A decision that is not a yes: withhold, hold, withdraw. */
export const refuseClearanceBody = reasonBody.extend({ shown: shownMarks.optional(), decidedAt });

/** A question to whoever asked, instead of a decision. */
export const askBackBody = z.strictObject({ question: text('question', 1000) });

/** The answer to what was asked back. */
export const answerBody = z.strictObject({ answer: text('answer', 2000) });

/** What the decider is shown, stored with the ask and again with each decision. */
export interface ClearanceEvidence {
	at: string;
	procedure: string | null;
	approach: string | null;
	/** The day of the operation, in the hospital's calendar; missing in what was stored before it was kept. */
	operatedOn?: string | null;
	postOpDay: number | null;
	level: number;
	betaBlocked: boolean | null;
	rhythm: string | null;
	/** How wound and breastbone stand; null where nobody has noted anything. */
	wound?: StandingWound | null;
	/** What is in, and the oxygen; missing in what was stored before they were noted. */
	lines?: LineKind[];
	oxygen?: SaidOxygen | null;
	precautions?: Precautions;
	/** The last ones, and all that were recorded since the ask or the decision before. */
	sessions: EvidenceSession[];
	/** Open calls for help, and those since the ask; missing in what was stored before they were kept. */
	escalations?: EvidenceEscalation[];
}

/** A session as a decider is shown it. */
export interface EvidenceSession {
	id: string;
	startedAt: string;
	outcome: Outcome;
	/** As it is read; missing in what was stored before it was kept. */
	readAs?: ReadAs<Outcome>;
	/** What stopped it, what cautioned, and what was not measured. */
	findings: string[];
	/** What was corrected in words since; missing in what was stored before it was kept. */
	amendments?: string[];
}

/** A call for help as a decider is shown it. */
export interface EvidenceEscalation {
	id: string;
	grade: Grade;
	state: EscalationState;
	situation: string;
	raisedAt: string;
}
