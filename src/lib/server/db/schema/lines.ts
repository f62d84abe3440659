import { sql } from 'drizzle-orm';
import { index, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { LINE_KINDS } from '../../../domain/lines/codes';
import { users } from './accounts';
import { id, instant } from './columns';
import { episodes } from './episodes';

/** What lies in a patient: a row from its being noted in to its being noted out, and nothing of it changes after that. */
export const lines = sqliteTable(
	'lines',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		kind: text('kind', { enum: LINE_KINDS }).notNull(),
		inBy: text('in_by')
			.notNull()
			.references(() => users.id),
		inAt: instant('in_at').notNull(),
		/** Both null while it is in. */
		outBy: text('out_by').references(() => users.id),
		outAt: instant('out_at')
	},
	(t) => [
		index('lines_episode').on(t.episodeId, t.inAt),
		// The database itself refuses a second one of a kind.
		uniqueIndex('lines_one_in')
			.on(t.episodeId, t.kind)
			.where(sql`out_at is null`)
	]
);

/** The flow of oxygen as somebody noted it, L/min, 0 for none; append-only. Sessions' readings tell of it too. */
export const oxygenNotes = sqliteTable(
	'oxygen_notes',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		lpm: real('lpm').notNull(),
		notedBy: text('noted_by')
			.notNull()
			.references(() => users.id),
		notedAt: instant('noted_at').notNull()
	},
	(t) => [index('oxygen_notes_episode').on(t.episodeId, t.notedAt)]
);
