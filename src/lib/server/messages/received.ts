import { alias } from 'drizzle-orm/sqlite-core';
import { desc, eq, type SQL } from 'drizzle-orm';
import { toRfc3339 } from '$lib/domain/core/instant';
import { endOfNumber, type LogReceiver } from '$lib/domain/messages/log';
import { readableWords, type ReceivedLine } from '$lib/domain/messages/received';
import { requirePermission } from '../access/require';
import type { PersonContext } from '../context';
import { db } from '../db';
import { inboundMessages, users } from '../db/schema';
import { page, type Page, type PageRequest } from '../http/paging';
import { before, cursorOf } from './newest-first';

/** What came in, the newest first. */
export async function listReceived(
	{ actor }: PersonContext,
	request: PageRequest
): Promise<Page<ReceivedLine>> {
	requirePermission(actor, 'message-log.read');
	const rows = await receivedRows(
		before(inboundMessages.at, inboundMessages.id, request.after),
		request.limit + 1
	);
	return page(rows.map(lineOf), request, ({ id, at }) => cursorOf(at, id));
}

type Row = Awaited<ReturnType<typeof receivedRows>>[number];

function receivedRows(where: SQL | undefined, limit: number) {
	const handler = alias(users, 'handler');
	return db()
		.select({
			text: inboundMessages,
			staff: { name: users.name, role: users.role },
			handledBy: handler.name
		})
		.from(inboundMessages)
		.leftJoin(users, eq(users.id, inboundMessages.userId))
		.leftJoin(handler, eq(handler.id, inboundMessages.handledBy))
		.where(where)
		.orderBy(desc(inboundMessages.at), desc(inboundMessages.id))
		.limit(limit);
}

function lineOf({ text, staff, handledBy }: Row): ReceivedLine {
	const { id, at, body, understoodAs, handledAt } = text;
	const words = readableWords(body);
	const wordsAre = body === '' ? 'removed' : words === null ? 'private' : 'shown';
	return {
		...{ id, at: toRfc3339(at), understoodAs, words, wordsAre },
		from: senderOf(text, staff),
		waits: handledAt === null,
		handled: handledAt === null || handledBy === null ? null : { by: handledBy, at: toRfc3339(handledAt) }
	};
}

/** As with what leaves: an administrator sees no patients, and learns of a number its end. */
function senderOf({ patientId, fromNumber }: Row['text'], staff: Row['staff']): LogReceiver {
	if (staff) {
		return { kind: 'staff', ...staff };
	}
	return { kind: patientId === null ? 'nobody' : 'patient', number: endOfNumber(fromNumber) };
}
