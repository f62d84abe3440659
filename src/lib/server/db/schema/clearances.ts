import { sql } from 'drizzle-orm';
import { index, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import type { ClearanceEvidence, ClearanceLimits } from '../../../domain/clearances/forms';
import { CLEARANCE_KINDS, CLEARANCE_STATES } from '../../../domain/core/codes';
import { users } from './accounts';
import { bedsideSessions } from './bedside';
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
		/** The limits that the ask proposes. */
		proposed: json<ClearanceLimits>('proposed'),
		/** What the decider was shown, as it was when the ask was made. */
		evidence: json<ClearanceEvidence>('evidence').notNull(),
		decidedBy: text('decided_by').references(() => users.id),
		decidedAt: instant('decided_at'),
		limits: json<ClearanceLimits>('limits'),
		reviewOn: text('review_on'),
		note: text('note'),
		reason: text('reason'),
		/** When whoever asked said that they saw the no; each decision empties it. */
		refusalSeenAt: instant('refusal_seen_at')
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
		/** Until when it was given; what was in force at an earlier instant is replayed from these rows. */
		reviewOn: text('review_on'),
		reason: text('reason'),
		/** What was shown when it was asked or decided, as it was at that instant. */
		evidence: json<ClearanceEvidence>('evidence')
	},
	(t) => [index('clearance_moves_clearance').on(t.clearanceId, t.at)]
);

/** A decider's question to whoever asked. It leaves the ask open, and is owed until it is answered. */
export const clearanceQuestions = sqliteTable(
	'clearance_questions',
	{
		id: id(),
		clearanceId: text('clearance_id')
			.notNull()
			.references(() => clearances.id),
		question: text('question').notNull(),
		askedBy: text('asked_by')
			.notNull()
			.references(() => users.id),
		askedAt: instant('asked_at').notNull(),
		answer: text('answer'),
		answeredBy: text('answered_by').references(() => users.id),
		answeredAt: instant('answered_at')
	},
	(t) => [
		index('clearance_questions_clearance').on(t.clearanceId, t.askedAt),
		uniqueIndex('clearance_questions_one_open')
			.on(t.clearanceId)
			.where(sql`answered_at is null`)
	]
);

/** Something done in a session without its clearance, until somebody who decides that kind has seen it. */
export const deviations = sqliteTable(
	'deviations',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		sessionId: text('session_id')
			.notNull()
			.references(() => bedsideSessions.id),
		kind: text('kind', { enum: CLEARANCE_KINDS }).notNull(),
		/** How the clearance stood when it was done; null when nobody had asked for it. */
		stood: text('stood', { enum: CLEARANCE_STATES }),
		reason: text('reason').notNull(),
		threadId: text('thread_id').references(() => threads.id),
		recordedBy: text('recorded_by')
			.notNull()
			.references(() => users.id),
		recordedAt: instant('recorded_at').notNull(),
		seenBy: text('seen_by').references(() => users.id),
		seenAt: instant('seen_at')
	},
	(t) => [index('deviations_episode').on(t.episodeId, t.seenAt), index('deviations_session').on(t.sessionId)]
);
