import { sql } from 'drizzle-orm';
import { check, index, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { POSTS } from '../../../domain/core/codes';
import { units, users } from './accounts';
import { id, instant, json } from './columns';

/** The log behind the live stream; its id is the cursor of the stream. Identifiers only, never content. */
export const liveEvents = sqliteTable(
	'live_events',
	{
		id: integer('id').primaryKey({ autoIncrement: true }),
		at: instant('at').notNull(),
		topic: text('topic').notNull(),
		kind: text('kind').notNull(),
		subjectId: text('subject_id').notNull(),
		episodeId: text('episode_id'),
		/** The unit that it concerns: where the episode was when it happened, or a unit that it left. */
		unitId: text('unit_id'),
		/** Set for what concerns one person alone. */
		userId: text('user_id')
	},
	(t) => [index('live_events_at').on(t.at)]
);

/** Hash-chained and append-only by triggers. No clinical text. */
export const audit = sqliteTable(
	'audit',
	{
		seq: integer('seq').primaryKey(),
		at: instant('at').notNull(),
		actorKind: text('actor_kind', { enum: ['person', 'patient', 'system', 'anonymous'] }).notNull(),
		actorId: text('actor_id').notNull(),
		/** Where the actor called from; null for the system's own work. */
		address: text('address'),
		action: text('action').notNull(),
		objectKind: text('object_kind').notNull(),
		objectId: text('object_id').notNull(),
		episodeId: text('episode_id'),
		outcome: text('outcome', { enum: ['done', 'refused'] }).notNull(),
		detail: json<Record<string, string | number | boolean | null>>('detail'),
		prev: text('prev').notNull(),
		hash: text('hash').notNull()
	},
	(t) => [
		index('audit_episode').on(t.episodeId, t.at),
		index('audit_actor').on(t.actorId, t.at),
		check('audit_hash_length', sql`length(hash) = 64`)
	]
);

/** First answers by the client's key, written in the transaction that they answer. */
export const idempotencyKeys = sqliteTable(
	'idempotency_keys',
	{
		actorId: text('actor_id').notNull(),
		path: text('path').notNull(),
		key: text('key').notNull(),
		digest: text('digest').notNull(),
		answer: json<unknown>('answer').notNull(),
		at: instant('at').notNull()
	},
	(t) => [primaryKey({ columns: [t.actorId, t.path, t.key] }), index('idempotency_keys_at').on(t.at)]
);

/** Who answers for a post on a unit, from when until when. */
export const coverShifts = sqliteTable(
	'cover_shifts',
	{
		id: id(),
		unitId: text('unit_id')
			.notNull()
			.references(() => units.id),
		post: text('post', { enum: POSTS }).notNull(),
		userId: text('user_id')
			.notNull()
			.references(() => users.id),
		startsAt: instant('starts_at').notNull(),
		endsAt: instant('ends_at').notNull()
	},
	(t) => [index('cover_shifts_now').on(t.unitId, t.post, t.startsAt)]
);

export const settings = sqliteTable('settings', {
	key: text('key').primaryKey(),
	value: json<unknown>('value').notNull(),
	changedAt: instant('changed_at').notNull(),
	changedBy: text('changed_by').references(() => users.id)
});
