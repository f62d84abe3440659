import { sql } from 'drizzle-orm';
import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { APPROACHES, CLOSE_REASONS, RHYTHMS, SEXES } from '../../../domain/core/codes';
import { PATIENT_FIELDS } from '../../../domain/episodes/identity';
import { OPERATION_FIELDS } from '../../../domain/episodes/operation';
import { units, users } from './accounts';
import { id, instant, yesNo } from './columns';

export const patients = sqliteTable(
	'patients',
	{
		id: id(),
		name: text('name').notNull(),
		/** Hospital number: the second identifier beside the birth date. */
		mrn: text('mrn').notNull().unique(),
		birthDate: text('birth_date').notNull(),
		sex: text('sex', { enum: SEXES }).notNull(),
		phone: text('phone'),
		language: text('language').notNull().default('en'),
		zone: text('zone').notNull(),
		smsConsent: yesNo('sms_consent').notNull().default(false),
		smsOptedOutAt: instant('sms_opted_out_at'),
		/** For mails about visits alone, and only with their consent: mail is read by others, as texts are. */
		email: text('email'),
		mailConsent: yesNo('mail_consent').notNull().default(false),
		createdAt: instant('created_at').notNull()
	},
	(t) => [index('patients_phone').on(t.phone)]
);

/** What a record of a patient said before it was amended, and by whom; append-only by trigger. */
export const patientAmendments = sqliteTable(
	'patient_amendments',
	{
		id: id(),
		patientId: text('patient_id')
			.notNull()
			.references(() => patients.id),
		at: instant('at').notNull(),
		/** Null where the patient changed it themselves, by text. */
		byId: text('by_id').references(() => users.id),
		field: text('field', { enum: PATIENT_FIELDS }).notNull(),
		before: text('before'),
		after: text('after')
	},
	(t) => [index('patient_amendments_patient').on(t.patientId, t.at)]
);

/** One stay for one operation; a return to theatre is another row of `operations` of the same episode. */
export const episodes = sqliteTable(
	'episodes',
	{
		id: id(),
		patientId: text('patient_id')
			.notNull()
			.references(() => patients.id),
		unitId: text('unit_id')
			.notNull()
			.references(() => units.id),
		/** Null in the outpatient programme. */
		bed: text('bed'),
		phase: text('phase', { enum: ['inpatient', 'outpatient'] })
			.notNull()
			.default('inpatient'),
		/** Today's level, which can fall; the highest one reached stays. */
		level: integer('level').notNull().default(1),
		levelReached: integer('level_reached').notNull().default(1),
		/** Any rate-slowing drug; null where nobody has said. */
		betaBlocked: yesNo('beta_blocked'),
		rhythm: text('rhythm', { enum: RHYTHMS }),
		surgeonId: text('surgeon_id').references(() => users.id),
		createdAt: instant('created_at').notNull(),
		closedAt: instant('closed_at'),
		closedFor: text('closed_for', { enum: CLOSE_REASONS })
	},
	(t) => [
		index('episodes_unit').on(t.unitId, t.closedAt),
		index('episodes_patient').on(t.patientId),
		uniqueIndex('episodes_bed_in_use')
			.on(t.unitId, t.bed)
			.where(sql`closed_at is null and bed is not null`)
	]
);

/** Day, precautions and clearances count from the latest. */
export const operations = sqliteTable(
	'operations',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		procedure: text('procedure').notNull(),
		approach: text('approach', { enum: APPROACHES }).notNull(),
		operatedAt: instant('operated_at').notNull(),
		surgeonId: text('surgeon_id').references(() => users.id),
		createdAt: instant('created_at').notNull()
	},
	(t) => [index('operations_episode').on(t.episodeId, t.operatedAt)]
);

/** What a record of an operation said before it was corrected, and by whom; append-only by trigger. */
export const operationAmendments = sqliteTable(
	'operation_amendments',
	{
		id: id(),
		operationId: text('operation_id')
			.notNull()
			.references(() => operations.id),
		at: instant('at').notNull(),
		byId: text('by_id')
			.notNull()
			.references(() => users.id),
		field: text('field', { enum: OPERATION_FIELDS }).notNull(),
		before: text('before'),
		after: text('after')
	},
	(t) => [index('operation_amendments_operation').on(t.operationId, t.at)]
);

/** Where the patient lay, from when until when. */
export const placements = sqliteTable(
	'placements',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		unitId: text('unit_id')
			.notNull()
			.references(() => units.id),
		bed: text('bed'),
		fromAt: instant('from_at').notNull(),
		untilAt: instant('until_at')
	},
	(t) => [index('placements_episode').on(t.episodeId, t.fromAt)]
);
