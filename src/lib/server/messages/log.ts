import { and, desc, eq, or, sql, type AnyColumn, type SQL } from 'drizzle-orm';
import { toRfc3339 } from '$lib/domain/core/instant';
import { MESSAGE_CHANNELS, MESSAGE_STATES } from '$lib/domain/messages/codes';
import { endOfNumber, type LogFilter, type LogLine, type LogReceiver } from '$lib/domain/messages/log';
import { requirePermission } from '../access/require';
import type { PersonContext } from '../context';
import { db } from '../db';
import { outbox, patients, users } from '../db/schema';
import { page, type Page, type PageRequest } from '../http/paging';
import { before, cursorOf } from './newest-first';

/** What is not known is no filter: an address that somebody typed shows more, never an error. */
export function logFilterOf({ searchParams }: URL): LogFilter {
	return {
		search: (searchParams.get('q') ?? '').trim().slice(0, 100),
		state: MESSAGE_STATES.find((state) => state === searchParams.get('state')) ?? null,
		channel: MESSAGE_CHANNELS.find((channel) => channel === searchParams.get('channel')) ?? null
	};
}

/** The messages that a filter leaves, the newest first. */
export async function listMessages(
	{ actor }: PersonContext,
	filter: LogFilter,
	request: PageRequest
): Promise<Page<LogLine>> {
	requirePermission(actor, 'message-log.read');
	const rows = await logRows(
		and(matching(filter), before(outbox.createdAt, outbox.id, request.after)),
		request.limit + 1
	);
	return page(rows.map(lineOf), request, ({ id, createdAt }) => cursorOf(createdAt, id));
}

export type LogRow = Awaited<ReturnType<typeof logRows>>[number];

export function logRows(where: SQL | undefined, limit: number) {
	return db()
		.select({
			message: outbox,
			staff: { name: users.name, role: users.role },
			patientPhone: patients.phone
		})
		.from(outbox)
		.leftJoin(users, eq(users.id, outbox.userId))
		.leftJoin(patients, eq(patients.id, outbox.patientId))
		.where(where)
		.orderBy(desc(outbox.createdAt), desc(outbox.id))
		.limit(limit);
}

export function lineOf({ message, staff, patientPhone }: LogRow): LogLine {
	const { id, kind, channel, state, stateReason, attempts, createdAt } = message;
	return {
		id,
		kind,
		channel,
		to: receiverOf(message, staff, patientPhone),
		state,
		reason: stateReason,
		attempts,
		createdAt: toRfc3339(createdAt)
	};
}

function receiverOf(
	{ patientId, address }: LogRow['message'],
	staff: LogRow['staff'],
	phone: string | null
): LogReceiver {
	if (staff) {
		return { kind: 'staff', ...staff };
	}
	return patientId === null
		? { kind: 'nobody', number: endOfNumber(address) }
		: { kind: 'patient', number: endOfNumber(phone) };
}

/** The name of a patient is not searched: whoever may not see it must not find out by guessing. */
function matching({ search, state, channel }: LogFilter): SQL | undefined {
	const part = `%${search.replace(/[\\%_]/g, (character) => `\\${character}`)}%`;
	const contains = (column: AnyColumn) => sql`${column} like ${part} escape '\\'`;
	const columns = [
		users.name,
		users.phone,
		patients.phone,
		outbox.address,
		outbox.body,
		outbox.subject,
		outbox.id,
		outbox.refId,
		outbox.providerId,
		outbox.stateReason
	];
	return and(
		search === '' ? undefined : or(...columns.map(contains)),
		state === null ? undefined : eq(outbox.state, state),
		channel === null ? undefined : eq(outbox.channel, channel)
	);
}
