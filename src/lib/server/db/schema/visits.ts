import { sql } from 'drizzle-orm';
import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { VISIT_STATES } from '../../../domain/core/codes';
import { units, users } from './accounts';
import { id, instant } from './columns';
import { episodes } from './episodes';

/** Local wall time, zone and the derived instant are all kept: a change of zone rules moves the instant alone. */
export const visits = sqliteTable(
	'visits',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		seriesId: text('series_id'),
		localDate: text('local_date').notNull(),
		localTime: text('local_time').notNull(),
		zone: text('zone').notNull(),
		startsAt: instant('starts_at').notNull(),
		minutes: integer('minutes').notNull(),
		/** Grows when the visit is moved or called off: of two calendar entries the one with the higher number counts. */
		sequence: integer('sequence').notNull().default(0),
		unitId: text('unit_id')
			.notNull()
			.references(() => units.id),
		place: text('place').notNull(),
		state: text('state', { enum: VISIT_STATES }).notNull(),
		reason: text('reason'),
		bookedBy: text('booked_by')
			.notNull()
			.references(() => users.id),
		bookedAt: instant('booked_at').notNull(),
		decidedAt: instant('decided_at'),
		/** When the patient cancelled it themselves; open until somebody has followed it up. */
		patientCancelledAt: instant('patient_cancelled_at'),
		followedUpAt: instant('followed_up_at'),
		followedUpBy: text('followed_up_by').references(() => users.id),
		/** When staff last cancelled it or gave it another time or place: the patient has to hear of that. */
		changedAt: instant('changed_at'),
		/** The start that the patient knew of until then. */
		changedFrom: instant('changed_from'),
		/** When a person told the patient, where no message did. */
		toldAt: instant('told_at'),
		toldBy: text('told_by').references(() => users.id)
	},
	(t) => [index('visits_start').on(t.startsAt), index('visits_episode').on(t.episodeId, t.startsAt)]
);

/** When a reminder of a visit is due; its text and its fate are the outbox row's. */
export const reminders = sqliteTable(
	'reminders',
	{
		id: id(),
		visitId: text('visit_id')
			.notNull()
			.references(() => visits.id),
		dueAt: instant('due_at').notNull(),
		/** The visit's when this was planned: after a move it is about a time that does not hold any more. */
		sequence: integer('sequence').notNull().default(0),
		messageId: text('message_id').notNull()
	},
	(t) => [index('reminders_visit').on(t.visitId)]
);

/** Days on which the hospital receives no visits. One that is taken off the list stays on record. */
export const closedDays = sqliteTable(
	'closed_days',
	{
		id: id(),
		date: text('date').notNull(),
		/** What day it is, in the hospital's words. */
		name: text('name').notNull(),
		addedBy: text('added_by')
			.notNull()
			.references(() => users.id),
		addedAt: instant('added_at').notNull(),
		removedAt: instant('removed_at'),
		removedBy: text('removed_by').references(() => users.id)
	},
	(t) => [
		uniqueIndex('closed_days_date')
			.on(t.date)
			.where(sql`removed_at is null`)
	]
);

/** Private links to a patient's own page; of the secret only its SHA-256 is stored. */
export const patientLinks = sqliteTable(
	'patient_links',
	{
		id: id(),
		tokenHash: text('token_hash').notNull().unique(),
		/** The stay whose visits it shows. */
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		way: text('way', { enum: ['sms', 'mail'] }).notNull(),
		createdBy: text('created_by')
			.notNull()
			.references(() => users.id),
		createdAt: instant('created_at').notNull(),
		expiresAt: instant('expires_at').notNull(),
		revokedAt: instant('revoked_at'),
		revokedBy: text('revoked_by').references(() => users.id)
	},
	(t) => [index('patient_links_episode').on(t.episodeId, t.createdAt)]
);
