import { index, integer, sqliteTable, text } from 'drizzle-orm/sqlite-core';
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
		followedUpBy: text('followed_up_by').references(() => users.id)
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
		messageId: text('message_id').notNull()
	},
	(t) => [index('reminders_visit').on(t.visitId)]
);
