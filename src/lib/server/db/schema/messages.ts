import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import {
	ATTEMPT_OUTCOMES,
	MESSAGE_CAUSES,
	MESSAGE_CHANNELS,
	MESSAGE_KINDS,
	MESSAGE_STATES
} from '../../../domain/messages/codes';
import { users } from './accounts';
import { id, instant } from './columns';
import { patients } from './episodes';
import { visits } from './visits';

/** Everything that leaves the product. A row is written in the transaction of its cause, once for each cause. */
export const outbox = sqliteTable(
	'outbox',
	{
		id: id(),
		kind: text('kind', { enum: MESSAGE_KINDS }).notNull(),
		channel: text('channel', { enum: MESSAGE_CHANNELS }).notNull(),
		causeKey: text('cause_key').notNull().unique(),
		/** Staff or patient; the address is looked up again at the moment of sending. */
		userId: text('user_id').references(() => users.id),
		patientId: text('patient_id').references(() => patients.id),
		/** Only for an answer to a number that belongs to nobody we know. */
		address: text('address'),
		/** The device that a notice is for; with no reference, because devices are removed. */
		deviceId: text('device_id'),
		subject: text('subject'),
		/**
		 * `{link}` stands for the secret link, which is made at the moment of sending and never stored. Empty once it was
		 * removed, a while after the end of the message.
		 */
		body: text('body').notNull(),
		/** A calendar file that goes with a mail about a visit. */
		calendar: text('calendar'),
		linkId: text('link_id'),
		refKind: text('ref_kind', { enum: MESSAGE_CAUSES }).notNull(),
		refId: text('ref_id').notNull(),
		state: text('state', { enum: MESSAGE_STATES }).notNull(),
		stateReason: text('state_reason'),
		attempts: integer('attempts').notNull().default(0),
		createdAt: instant('created_at').notNull(),
		nextAt: instant('next_at').notNull(),
		expiresAt: instant('expires_at').notNull(),
		leaseOwner: text('lease_owner'),
		leaseUntil: instant('lease_until'),
		sentAt: instant('sent_at'),
		providerId: text('provider_id'),
		/** Of one that did not arrive: when a person saw to it in another way. */
		handledAt: instant('handled_at'),
		handledBy: text('handled_by').references(() => users.id)
	},
	(t) => [
		index('outbox_due').on(t.state, t.nextAt),
		index('outbox_ref').on(t.refKind, t.refId),
		index('outbox_provider').on(t.providerId)
	]
);

/** One row for each try, append-only. */
export const outboxAttempts = sqliteTable(
	'outbox_attempts',
	{
		id: id(),
		messageId: text('message_id')
			.notNull()
			.references(() => outbox.id),
		number: integer('number').notNull(),
		startedAt: instant('started_at').notNull(),
		endedAt: instant('ended_at').notNull(),
		outcome: text('outcome', { enum: ATTEMPT_OUTCOMES }).notNull(),
		/** A status or error code of the gateway, never its prose. */
		code: text('code'),
		providerId: text('provider_id')
	},
	(t) => [index('outbox_attempts_message').on(t.messageId, t.number)]
);

/** That a person had a message sent again, and why; append-only. Its schedule begins anew with it. */
export const outboxResends = sqliteTable(
	'outbox_resends',
	{
		id: id(),
		messageId: text('message_id')
			.notNull()
			.references(() => outbox.id),
		at: instant('at').notNull(),
		byId: text('by_id')
			.notNull()
			.references(() => users.id),
		reason: text('reason').notNull()
	},
	(t) => [index('outbox_resends_message').on(t.messageId, t.at)]
);

/** What the gateway told us about a message. The unique index makes a replay harmless. */
export const smsStatuses = sqliteTable(
	'sms_statuses',
	{
		id: id(),
		providerId: text('provider_id').notNull(),
		status: text('status').notNull(),
		/** The gateway's number of the error, where it did not arrive. */
		errorCode: text('error_code'),
		at: instant('at').notNull()
	},
	(t) => [uniqueIndex('sms_statuses_once').on(t.providerId, t.status)]
);

/** Texts that people sent to us, once for each message of the gateway. */
export const inboundMessages = sqliteTable('inbound_messages', {
	id: id(),
	providerId: text('provider_id').notNull().unique(),
	fromNumber: text('from_number').notNull(),
	body: text('body').notNull(),
	at: instant('at').notNull(),
	patientId: text('patient_id').references(() => patients.id),
	userId: text('user_id').references(() => users.id),
	understoodAs: text('understood_as').notNull(),
	/** The visit that the text was an answer to, where it was one. */
	visitId: text('visit_id').references(() => visits.id),
	/** Null while a person still has to look at it. */
	handledAt: instant('handled_at'),
	handledBy: text('handled_by').references(() => users.id),
	/** What that person did about it: who was called, what was said. */
	handledNote: text('handled_note')
});
