import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { PRIORITIES, REFERRAL_STATES, SERVICES, STRANDS } from '../../../domain/core/codes';
import { ENTRY_KINDS, REF_KINDS } from '../../../domain/referrals/entries';
import { users } from './accounts';
import { id, instant, json } from './columns';
import { episodes } from './episodes';

export const referrals = sqliteTable(
	'referrals',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		service: text('service', { enum: SERVICES }).notNull(),
		priority: text('priority', { enum: PRIORITIES }).notNull(),
		question: text('question').notNull(),
		state: text('state', { enum: REFERRAL_STATES }).notNull(),
		askedBy: text('asked_by')
			.notNull()
			.references(() => users.id),
		askedAt: instant('asked_at').notNull(),
		decidedBy: text('decided_by').references(() => users.id),
		decidedAt: instant('decided_at'),
		reason: text('reason')
	},
	(t) => [index('referrals_episode').on(t.episodeId), index('referrals_state').on(t.state, t.service)]
);

export const threads = sqliteTable(
	'threads',
	{
		id: id(),
		referralId: text('referral_id')
			.notNull()
			.unique()
			.references(() => referrals.id),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		/** The number of the newest entry: numbers are given inside the transaction, without gaps. */
		lastSeq: integer('last_seq').notNull().default(0)
	},
	(t) => [index('threads_episode').on(t.episodeId)]
);

/** Append-only by trigger. A correction is another entry that amends. */
export const entries = sqliteTable(
	'entries',
	{
		id: id(),
		threadId: text('thread_id')
			.notNull()
			.references(() => threads.id),
		seq: integer('seq').notNull(),
		at: instant('at').notNull(),
		/** Null when the patient or the system speaks. */
		authorId: text('author_id').references(() => users.id),
		strand: text('strand', { enum: STRANDS }).notNull(),
		kind: text('kind', { enum: ENTRY_KINDS }).notNull(),
		body: text('body').notNull(),
		refKind: text('ref_kind', { enum: REF_KINDS }),
		refId: text('ref_id'),
		mentions: json<string[]>('mentions').notNull().default([])
	},
	(t) => [
		uniqueIndex('entries_thread_seq').on(t.threadId, t.seq),
		index('entries_ref').on(t.refKind, t.refId)
	]
);

/** A question that an entry puts to somebody: open until they write into the thread, or say that they have seen it. */
export const mentions = sqliteTable(
	'mentions',
	{
		id: id(),
		entryId: text('entry_id')
			.notNull()
			.references(() => entries.id),
		userId: text('user_id')
			.notNull()
			.references(() => users.id),
		seenAt: instant('seen_at')
	},
	(t) => [uniqueIndex('mentions_once').on(t.entryId, t.userId), index('mentions_open').on(t.userId, t.seenAt)]
);
