import { sql } from 'drizzle-orm';
import { index, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import type { ClearanceEvidence, ClearanceLimits } from '../../../domain/clearances/forms';
import { CLEARANCE_KINDS, CLEARANCE_STATES } from '../../../domain/core/codes';
import { users } from './accounts';
import { id, instant, json } from './columns';
import { episodes, operations } from './episodes';
import { threads } from './referrals';

export const clearances = sqliteTable(
	'clearances',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		/** The operation it counts from; a return to theatre makes earlier ones void. */
		operationId: text('operation_id').references(() => operations.id),
		threadId: text('thread_id').references(() => threads.id),
		kind: text('kind', { enum: CLEARANCE_KINDS }).notNull(),
		state: text('state', { enum: CLEARANCE_STATES }).notNull(),
		question: text('question').notNull(),
		askedBy: text('asked_by')
			.notNull()
			.references(() => users.id),
		askedAt: instant('asked_at').notNull(),
		/** What the decider was shown, as it was when the ask was made. */
		evidence: json<ClearanceEvidence>('evidence').notNull(),
		decidedBy: text('decided_by').references(() => users.id),
		decidedAt: instant('decided_at'),
		limits: json<ClearanceLimits>('limits'),
		reviewOn: text('review_on'),
		note: text('note'),
		reason: text('reason')
	},
	(t) => [
		index('clearances_episode').on(t.episodeId, t.kind),
		// One of a kind open or in force: the database says no even when two people ask at once.
		uniqueIndex('clearances_one_open')
			.on(t.episodeId, t.kind)
			.where(sql`state in ('asked', 'given', 'given-with-limits', 'on-hold')`)
	]
);

/** Every move of a clearance, append-only. */
export const clearanceMoves = sqliteTable(
	'clearance_moves',
	{
		id: id(),
		clearanceId: text('clearance_id')
			.notNull()
			.references(() => clearances.id),
		at: instant('at').notNull(),
		byId: text('by_id').references(() => users.id),
		fromState: text('from_state', { enum: CLEARANCE_STATES }),
		toState: text('to_state', { enum: CLEARANCE_STATES }).notNull(),
		limits: json<ClearanceLimits>('limits'),
		reason: text('reason')
	},
	(t) => [index('clearance_moves_clearance').on(t.clearanceId, t.at)]
);
