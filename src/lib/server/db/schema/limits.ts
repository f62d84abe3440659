import { index, integer, real, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import type { LocalLines } from '../../../domain/bedside/activities/local';
import { ACTIVITY_CODES } from '../../../domain/bedside/activities/codes';
import { LIMIT_KEYS, SETS } from '../../../domain/bedside/codes';
import { PRESCRIBING_METHODS } from '../../../domain/bedside/limits/prescribed';
import { units, users } from './accounts';
import { id, instant, json } from './columns';
import { episodes } from './episodes';

/**
 * What a unit changed of the default limits, append-only. The newest row of a set and key holds; a value of null
 * goes back to the default. A row without a key chooses `set` as the one that judges the unit's inpatients.
 */
export const unitLimitChanges = sqliteTable(
	'unit_limit_changes',
	{
		id: id(),
		unitId: text('unit_id')
			.notNull()
			.references(() => units.id),
		/** Counts the changes of the unit; findings name it. */
		version: integer('version').notNull(),
		set: text('limit_set', { enum: SETS }).notNull(),
		key: text('limit_key', { enum: LIMIT_KEYS }),
		value: real('value'),
		/** The clinical lead who answers for it, and the day on which it was agreed. */
		agreedBy: text('agreed_by').notNull(),
		agreedOn: text('agreed_on').notNull(),
		changedBy: text('changed_by')
			.notNull()
			.references(() => users.id),
		changedAt: instant('changed_at').notNull()
	},
	(t) => [uniqueIndex('unit_limit_changes_version').on(t.unitId, t.version)]
);

/** Limits of one patient, each with its reason and its last day. The newest of a key holds while it lasts. */
export const patientLimits = sqliteTable(
	'patient_limits',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		version: integer('version').notNull(),
		key: text('limit_key', { enum: LIMIT_KEYS }).notNull(),
		value: real('value').notNull(),
		reason: text('reason').notNull(),
		/** The last local day on which it holds. */
		untilOn: text('until_on').notNull(),
		setBy: text('set_by')
			.notNull()
			.references(() => users.id),
		setAt: instant('set_at').notNull(),
		endedBy: text('ended_by').references(() => users.id),
		endedAt: instant('ended_at')
	},
	(t) => [
		uniqueIndex('patient_limits_version').on(t.episodeId, t.version),
		index('patient_limits_episode').on(t.episodeId, t.setAt)
	]
);

/**
 * The range of heart rate and exertion prescribed for an outpatient, append-only. The newest row holds; one without
 * a method ends what was prescribed.
 */
export const prescribedRanges = sqliteTable(
	'prescribed_ranges',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		version: integer('version').notNull(),
		hrMin: real('hr_min'),
		hrMax: real('hr_max'),
		rpeMin: real('rpe_min'),
		rpeMax: real('rpe_max'),
		method: text('method', { enum: PRESCRIBING_METHODS }),
		note: text('note'),
		prescribedBy: text('prescribed_by')
			.notNull()
			.references(() => users.id),
		prescribedAt: instant('prescribed_at').notNull()
	},
	(t) => [uniqueIndex('prescribed_ranges_version').on(t.episodeId, t.version)]
);

/** What a unit says about an activity in place of the catalogue, append-only; null goes back to the catalogue. */
export const unitActivityChanges = sqliteTable(
	'unit_activity_changes',
	{
		id: id(),
		unitId: text('unit_id')
			.notNull()
			.references(() => units.id),
		version: integer('version').notNull(),
		code: text('activity', { enum: ACTIVITY_CODES }).notNull(),
		lines: json<LocalLines>('lines'),
		agreedBy: text('agreed_by').notNull(),
		agreedOn: text('agreed_on').notNull(),
		changedBy: text('changed_by')
			.notNull()
			.references(() => users.id),
		changedAt: instant('changed_at').notNull()
	},
	(t) => [uniqueIndex('unit_activity_changes_version').on(t.unitId, t.version)]
);
