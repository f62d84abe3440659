import { asc, eq, inArray } from 'drizzle-orm';
import { notFound } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { mayBeResent, type LogEvent, type MessageStory } from '$lib/domain/messages/log';
import { requirePermission } from '../access/require';
import type { PersonContext } from '../context';
import { db } from '../db';
import { outbox, outboxAttempts, outboxResends, smsStatuses, users } from '../db/schema';
import { lineOf, logRows } from './log';

/**
 * One message from its cause to its end: each attempt, what the gateway answered and told later, who had it sent again.
 * @throws Problem `not-found`
 */
export async function getStory({ actor }: PersonContext, id: string): Promise<MessageStory> {
	requirePermission(actor, 'message-log.read');
	const [row] = await logRows(eq(outbox.id, id), 1);
	if (!row) {
		throw notFound('message');
	}
	const { message } = row;
	const waits = message.state === 'ready' || message.state === 'held';
	return {
		...lineOf(row),
		cause: { kind: message.refKind, id: message.refId },
		subject: message.subject,
		body: message.body || null,
		providerId: message.providerId,
		nextAt: waits ? toRfc3339(message.nextAt) : null,
		expiresAt: toRfc3339(message.expiresAt),
		mayResend: mayBeResent(message.state),
		events: await eventsOf(message)
	};
}

async function eventsOf(message: typeof outbox.$inferSelect): Promise<LogEvent[]> {
	const attempts = await db()
		.select()
		.from(outboxAttempts)
		.where(eq(outboxAttempts.messageId, message.id))
		.orderBy(asc(outboxAttempts.number));
	const known = [...attempts.map(({ providerId }) => providerId), message.providerId];
	const written: LogEvent = { what: 'written', at: toRfc3339(message.createdAt) };
	const events: LogEvent[] = [
		written,
		...attempts.map(({ startedAt, endedAt, number, outcome, code }) => ({
			what: 'attempt' as const,
			at: toRfc3339(startedAt),
			endedAt: toRfc3339(endedAt),
			number,
			outcome,
			code
		})),
		...(await toldOf(known.filter((id) => id !== null))),
		...(await resentOf(message.id)),
		...(await handledOf(message))
	];
	// All of one form and in UTC, so that their order is that of their letters; of the same instant the order above.
	return events.toSorted((a, b) => (a.at < b.at ? -1 : Number(a.at > b.at)));
}

async function toldOf(providerIds: string[]): Promise<LogEvent[]> {
	const rows = await db()
		.select()
		.from(smsStatuses)
		.where(inArray(smsStatuses.providerId, providerIds))
		.orderBy(asc(smsStatuses.at), asc(smsStatuses.id));
	return rows.map(({ at, status, errorCode }) => ({ what: 'told', at: toRfc3339(at), status, errorCode }));
}

async function resentOf(messageId: string): Promise<LogEvent[]> {
	const rows = await db()
		.select({ at: outboxResends.at, by: users.name, reason: outboxResends.reason })
		.from(outboxResends)
		.innerJoin(users, eq(users.id, outboxResends.byId))
		.where(eq(outboxResends.messageId, messageId))
		.orderBy(asc(outboxResends.at), asc(outboxResends.id));
	return rows.map((row) => ({ what: 'resent', ...row, at: toRfc3339(row.at) }));
}

async function handledOf({ handledAt, handledBy }: typeof outbox.$inferSelect): Promise<LogEvent[]> {
	if (handledAt === null || handledBy === null) {
		return [];
	}
	const [by] = await db().select({ name: users.name }).from(users).where(eq(users.id, handledBy));
	return [{ what: 'handled', at: toRfc3339(handledAt), by: by?.name ?? '' }];
}
