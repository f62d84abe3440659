import { index, integer, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import type { KeptBar } from '../../../domain/bedside/drawn';
import { SETS } from '../../../domain/bedside/codes';
import { SESSION_AMENDMENTS } from '../../../domain/bedside/amended';
import { RHYTHMS } from '../../../domain/core/codes';
import { STERNUM_FINDINGS, WOUND_FINDINGS } from '../../../domain/wounds/codes';
import { users } from './accounts';
import { id, instant, json, yesNo } from './columns';
import { episodes, operations } from './episodes';

/** One bedside treatment. Context, symptoms and activities keep the shape in which they were sent. */
export const bedsideSessions = sqliteTable(
	'bedside_sessions',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		operationId: text('operation_id').references(() => operations.id),
		startedAt: instant('started_at').notNull(),
		endedAt: instant('ended_at').notNull(),
		level: integer('level').notNull(),
		context: json<Record<string, unknown>>('context').notNull(),
		symptoms: json<unknown[]>('symptoms').notNull(),
		activities: json<unknown[]>('activities').notNull(),
		outcome: text('outcome', { enum: ['stop', 'incomplete', 'caution', 'clear'] }).notNull(),
		notJudged: json<string[]>('not_judged').notNull(),
		/** Which limits judged it: the findings can be explained years later. */
		limitSet: text('limit_set').notNull(),
		limitVersion: text('limit_version').notNull(),
		/** The limits beside each value, as `barsOf` gave them; null for sessions of before these were kept. */
		bars: json<KeptBar[]>('bars'),
		deviation: json<Record<string, unknown>>('deviation'),
		recordedBy: text('recorded_by')
			.notNull()
			.references(() => users.id),
		recordedAt: instant('recorded_at').notNull()
	},
	(t) => [index('bedside_sessions_episode').on(t.episodeId, t.startedAt)]
);

/** What was said about a session after it was recorded; what it says itself is never changed. Append-only by trigger. */
export const sessionAmendments = sqliteTable(
	'session_amendments',
	{
		id: id(),
		sessionId: text('session_id')
			.notNull()
			.references(() => bedsideSessions.id),
		kind: text('kind', { enum: SESSION_AMENDMENTS }).notNull(),
		body: text('body').notNull(),
		byId: text('by_id')
			.notNull()
			.references(() => users.id),
		at: instant('at').notNull()
	},
	(t) => [index('session_amendments_session').on(t.sessionId, t.at)]
);

/** Units: beats/min, mmHg, %, breaths/min, Borg 6-20, 0-10, L/min. */
export const readings = sqliteTable(
	'readings',
	{
		id: id(),
		sessionId: text('session_id')
			.notNull()
			.references(() => bedsideSessions.id),
		phase: text('phase', { enum: ['before', 'during', 'after'] }).notNull(),
		ordinal: integer('ordinal').notNull(),
		at: instant('at'),
		posture: text('posture', { enum: ['lying', 'sitting', 'standing'] }),
		settled: yesNo('settled'),
		work: real('work'),
		bpSource: text('bp_source', { enum: ['cuff', 'arterial'] }),
		rhythm: text('rhythm', { enum: RHYTHMS }),
		hr: real('hr'),
		sbp: real('sbp'),
		dbp: real('dbp'),
		spo2: real('spo2'),
		rr: real('rr'),
		rpe: real('rpe'),
		pain: real('pain'),
		oxygenLpm: real('oxygen_lpm')
	},
	(t) => [index('readings_session').on(t.sessionId, t.phase, t.ordinal)]
);

export const findings = sqliteTable(
	'findings',
	{
		id: id(),
		sessionId: text('session_id')
			.notNull()
			.references(() => bedsideSessions.id),
		ordinal: integer('ordinal').notNull(),
		rule: text('rule').notNull(),
		grade: text('grade', { enum: ['stop', 'caution', 'note'] }).notNull(),
		reading: text('reading', { enum: ['before', 'during', 'after'] }).notNull(),
		measured: json<number | string | null>('measured'),
		limit: json<number | string | null>('limit'),
		unit: text('unit'),
		/** The set and the version of that very limit; null for findings older than these columns. */
		set: text('limit_set', { enum: SETS }),
		version: text('limit_version'),
		reason: text('reason').notNull(),
		source: text('source').notNull()
	},
	(t) => [index('findings_session').on(t.sessionId, t.ordinal)]
);

/** What somebody saw of the wound and felt of the breastbone; append-only, the newest counts. */
export const woundNotes = sqliteTable(
	'wound_notes',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		/** Null where nobody looked. */
		wound: text('wound', { enum: WOUND_FINDINGS }),
		sternum: text('sternum', { enum: STERNUM_FINDINGS }),
		note: text('note'),
		notedBy: text('noted_by')
			.notNull()
			.references(() => users.id),
		notedAt: instant('noted_at').notNull()
	},
	(t) => [index('wound_notes_episode').on(t.episodeId, t.notedAt)]
);
