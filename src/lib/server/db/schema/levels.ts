import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { SUGGESTIONS } from '../../../domain/bedside/progress';
import { SIGN_OFF_KINDS, SIGN_OFF_STATES } from '../../../domain/bedside/sign-off';
import { users } from './accounts';
import { bedsideSessions } from './bedside';
import { id, instant } from './columns';
import { episodes } from './episodes';

/** Who moved a patient to which level, on what advice. Append-only: today's level is that of the episode. */
export const levelDecisions = sqliteTable(
	'level_decisions',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		fromLevel: integer('from_level').notNull(),
		toLevel: integer('to_level').notNull(),
		/** What the last session spoke for; null where there was none. */
		suggestion: text('suggestion', { enum: SUGGESTIONS }),
		sessionId: text('session_id').references(() => bedsideSessions.id),
		reason: text('reason'),
		decidedBy: text('decided_by')
			.notNull()
			.references(() => users.id),
		decidedAt: instant('decided_at').notNull(),
		/** The senior who signed for it, where one had to. */
		signedBy: text('signed_by').references(() => users.id)
	},
	(t) => [index('level_decisions_episode').on(t.episodeId, t.decidedAt)]
);

/** What a junior did or proposes beyond the cautious figure, until a senior has signed for it or said no. */
export const signOffs = sqliteTable(
	'sign_offs',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		kind: text('kind', { enum: SIGN_OFF_KINDS }).notNull(),
		state: text('state', { enum: SIGN_OFF_STATES }).notNull(),
		sessionId: text('session_id').references(() => bedsideSessions.id),
		/** The level proposed, for a level. */
		toLevel: integer('to_level'),
		/** What it is about, in a sentence. */
		words: text('words').notNull(),
		askedBy: text('asked_by')
			.notNull()
			.references(() => users.id),
		askedAt: instant('asked_at').notNull(),
		decidedBy: text('decided_by').references(() => users.id),
		decidedAt: instant('decided_at'),
		reason: text('reason')
	},
	(t) => [index('sign_offs_episode').on(t.episodeId, t.state)]
);
