import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { MESSAGE_CHANNELS } from '../../../domain/messages/channels';
import { users } from './accounts';
import { id, instant } from './columns';
import { patients } from './episodes';
import { visits } from './visits';

export const MESSAGE_KINDS = ['escalation', 'notice', 'reminder', 'answer', 'mail', 'visit', 'page'] as const;
export const MESSAGE_STATES = [
	'ready',
	'sending',
	'accepted',
	'delivered',
	'undelivered',
	'failed',
	'skipped',
	'cancelled',
	'held'
] as const;

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
		subject: text('subject'),
		/** `{link}` stands for the secret link, which is made at the moment of sending and never stored. */
		body: text('body').notNull(),
		/** A calendar file that goes with a mail about a visit. */
		calendar: text('calendar'),
		linkId: text('link_id'),
		refKind: text('ref_kind', {
			enum: ['escalation', 'visit', 'referral', 'inbound', 'account', 'episode', 'page']
		}).notNull(),
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
		outcome: text('outcome', { enum: ['accepted', 'permanent', 'transient', 'unknown'] }).notNull(),
		/** A status or error code of the gateway, never its prose. */
		code: text('code'),
		providerId: text('provider_id')
	},
	(t) => [index('outbox_attempts_message').on(t.messageId, t.number)]
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
