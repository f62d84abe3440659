import { sql } from 'drizzle-orm';
import { index, integer, sqliteTable, text, uniqueIndex } from 'drizzle-orm/sqlite-core';
import { ESCALATION_MOVES, ESCALATION_STATES, GRADES, POSTS } from '../../../domain/core/codes';
import { MESSAGE_CHANNELS } from '../../../domain/messages/codes';
import { units, users } from './accounts';
import { bedsideSessions } from './bedside';
import { id, instant, json, yesNo } from './columns';
import { episodes } from './episodes';
import { threads } from './referrals';

export const escalations = sqliteTable(
	'escalations',
	{
		id: id(),
		episodeId: text('episode_id')
			.notNull()
			.references(() => episodes.id),
		unitId: text('unit_id')
			.notNull()
			.references(() => units.id),
		grade: text('grade', { enum: GRADES }).notNull(),
		state: text('state', { enum: ESCALATION_STATES }).notNull(),
		situation: text('situation').notNull(),
		background: text('background').notNull(),
		assessment: text('assessment').notNull(),
		request: text('request').notNull(),
		neededBy: instant('needed_by'),
		toldInPerson: text('told_in_person').references(() => users.id),
		sessionId: text('session_id').references(() => bedsideSessions.id),
		threadId: text('thread_id').references(() => threads.id),
		raisedBy: text('raised_by')
			.notNull()
			.references(() => users.id),
		raisedAt: instant('raised_at').notNull(),
		/**
		 * What everybody who is told may reply TAKE with. One for the call and not for the person: colleagues read it
		 * to each other, and who takes it is decided by the number that the reply comes from.
		 */
		replyCode: text('reply_code'),
		/** The one holder, from taking until it is settled or passed on. */
		takenBy: text('taken_by').references(() => users.id),
		takenAt: instant('taken_at'),
		etaMinutes: integer('eta_minutes'),
		/** When the minutes were given: with the taking, or changed later. */
		etaGivenAt: instant('eta_given_at'),
		/** When the holder is asked whether they are there; null when nobody is to be asked. */
		askHolderAt: instant('ask_holder_at'),
		/** When they were asked; null while they were not, or have answered. */
		holderAskedAt: instant('holder_asked_at'),
		arrivedAt: instant('arrived_at'),
		passTo: text('pass_to').references(() => users.id),
		passReason: text('pass_reason'),
		endedBy: text('ended_by').references(() => users.id),
		endedAt: instant('ended_at'),
		outcome: text('outcome'),
		note: text('note'),
		informed: text('informed'),
		recheckDueAt: instant('recheck_due_at'),
		recheckDoneAt: instant('recheck_done_at'),
		/**
		 * The chain: which step comes next and when. While somebody has it the time is null and the step stays, so
		 * that the chain can go on from there; a time beside a holder means that others are sought all the same.
		 */
		nextStep: integer('next_step'),
		nextStepAt: instant('next_step_at'),
		/** From when the steps count; moved when a worse grade starts the chain again, or when it goes on after a stop. */
		chainStartedAt: instant('chain_started_at').notNull()
	},
	(t) => [
		index('escalations_episode').on(t.episodeId, t.raisedAt),
		index('escalations_timer').on(t.nextStepAt),
		index('escalations_ask').on(t.askHolderAt),
		index('escalations_state').on(t.state, t.unitId),
		// One patient, one untaken escalation: later facts are added to it.
		uniqueIndex('escalations_one_untaken')
			.on(t.episodeId)
			.where(sql`state = 'raised'`),
		// A reply means one open call. Once it has ended its code may be given again.
		uniqueIndex('escalations_reply_code')
			.on(t.replyCode)
			.where(sql`state in ('raised', 'taken')`)
	]
);

/**
 * What a second caller said about an escalation that was open already: a row of its own with who and when,
 * append-only. The first call stays as it was said.
 */
export const escalationFacts = sqliteTable(
	'escalation_facts',
	{
		id: id(),
		escalationId: text('escalation_id')
			.notNull()
			.references(() => escalations.id),
		byId: text('by_id')
			.notNull()
			.references(() => users.id),
		at: instant('at').notNull(),
		grade: text('grade', { enum: GRADES }).notNull(),
		/** Whether it made the escalation graver and started the chain again. */
		raisedGrade: yesNo('raised_grade').notNull(),
		situation: text('situation').notNull(),
		background: text('background').notNull(),
		assessment: text('assessment').notNull(),
		request: text('request').notNull(),
		neededBy: instant('needed_by'),
		toldInPerson: text('told_in_person').references(() => users.id),
		sessionId: text('session_id').references(() => bedsideSessions.id),
		threadId: text('thread_id').references(() => threads.id)
	},
	(t) => [index('escalation_facts_escalation').on(t.escalationId, t.at)]
);

/** Who was told, by which step of the chain and when; one row for each person, append-only. */
export const escalationSteps = sqliteTable(
	'escalation_steps',
	{
		id: id(),
		escalationId: text('escalation_id')
			.notNull()
			.references(() => escalations.id),
		step: integer('step').notNull(),
		post: text('post', { enum: POSTS }).notNull(),
		/** When the step was due; how late it ran is `at` minus this. */
		dueAt: instant('due_at').notNull(),
		at: instant('at').notNull(),
		/** Null when nobody was on cover for the post: the gap is on record. */
		userId: text('user_id').references(() => users.id),
		channel: text('channel', { enum: MESSAGE_CHANNELS }),
		messageId: text('message_id')
	},
	(t) => [index('escalation_steps_escalation').on(t.escalationId, t.step)]
);

/** What happened to an escalation, in order, append-only. */
export const escalationMoves = sqliteTable(
	'escalation_moves',
	{
		id: id(),
		escalationId: text('escalation_id')
			.notNull()
			.references(() => escalations.id),
		at: instant('at').notNull(),
		byId: text('by_id').references(() => users.id),
		kind: text('kind', {
			enum: ESCALATION_MOVES
		}).notNull(),
		detail: json<Record<string, unknown>>('detail')
	},
	(t) => [index('escalation_moves_escalation').on(t.escalationId, t.at)]
);

/** The secret in an SMS link: bound to one person, single use, expiring; only its SHA-256 is stored. */
export const escalationLinks = sqliteTable('escalation_links', {
	id: id(),
	escalationId: text('escalation_id')
		.notNull()
		.references(() => escalations.id),
	userId: text('user_id')
		.notNull()
		.references(() => users.id),
	tokenHash: text('token_hash').notNull().unique(),
	createdAt: instant('created_at').notNull(),
	expiresAt: instant('expires_at').notNull(),
	usedAt: instant('used_at')
});
