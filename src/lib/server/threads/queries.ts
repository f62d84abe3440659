import { and, asc, eq, exists, gt, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import type { Person } from '$lib/domain/access/actor';
import { mayReadEntry } from '$lib/domain/access/entries';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { AskedPerson, EntryLine, ThreadView } from '$lib/domain/referrals/views';
import { m } from '$lib/i18n/paraglide/messages';
import { accessThread } from '../access/access';
import type { Reader } from '../db';
import { entries, mentions, referrals, users } from '../db/schema';
import { page, type PageRequest } from '../http/paging';

/** A thread with its referral and its entries, oldest first; the cursor is the number of the last entry. */
export async function getThread(
	db: Reader,
	person: Person,
	threadId: string,
	request: PageRequest
): Promise<ThreadView> {
	const { thread, episode } = await accessThread(db, person, threadId, 'thread.read');
	const [referral, rows] = await Promise.all([
		referralOf(db, thread.referralId),
		db
			.select({ entry: entries, author: { id: users.id, name: users.name, role: users.role } })
			.from(entries)
			.leftJoin(users, eq(users.id, entries.authorId))
			.where(and(eq(entries.threadId, threadId), gt(entries.seq, seqAfter(request.after))))
			.orderBy(asc(entries.seq))
			.limit(request.limit + 1)
	]);
	const { items, next } = page(rows, request, (row) => String(row.entry.seq));
	const asked = await askedIn(db, threadId);
	const lines = items.map(({ entry, author }) => {
		const line = toLine(entry, author, asked.get(entry.id) ?? []);
		return mayReadEntry(person, episode.unitId, entry.refKind) ? line : withheld(line);
	});
	return { referral, items: lines, next };
}

/** Whom the entries of a thread ask, by entry. */
async function askedIn(db: Reader, threadId: string): Promise<Map<string, AskedPerson[]>> {
	const later = alias(entries, 'later');
	const answered = db
		.select({ id: later.id })
		.from(later)
		.where(
			and(
				eq(later.threadId, entries.threadId),
				gt(later.seq, entries.seq),
				eq(later.authorId, mentions.userId)
			)
		);
	const rows = await db
		.select({
			entryId: mentions.entryId,
			mentionId: mentions.id,
			id: users.id,
			name: users.name,
			open: sql<number>`${mentions.seenAt} is null and not ${exists(answered)}`
		})
		.from(mentions)
		.innerJoin(entries, eq(entries.id, mentions.entryId))
		.innerJoin(users, eq(users.id, mentions.userId))
		.where(eq(entries.threadId, threadId))
		.orderBy(asc(users.name));
	const asked = new Map<string, AskedPerson[]>();
	for (const { entryId, open, ...person } of rows) {
		asked.set(entryId, [...(asked.get(entryId) ?? []), { ...person, open: open === 1 }]);
	}
	return asked;
}

function seqAfter(cursor: string | null): number {
	const seq = Number(cursor ?? 0);
	if (!Number.isSafeInteger(seq) || seq < 0) {
		throw new Problem('malformed', `The cursor ${String(cursor).slice(0, 40)} is not one of ours.`);
	}
	return seq;
}

function toLine(
	entry: typeof entries.$inferSelect,
	author: EntryLine['author'],
	asked: AskedPerson[]
): EntryLine {
	return {
		id: entry.id,
		seq: entry.seq,
		at: toRfc3339(entry.at),
		author,
		strand: entry.strand,
		kind: entry.kind,
		body: entry.body,
		ref: entry.refKind && entry.refId ? { kind: entry.refKind, id: entry.refId } : null,
		asked
	};
}

/** That something was said, by whom and when, without what: the numbers of a thread have no gaps. */
function withheld(line: EntryLine): EntryLine {
	return { ...line, body: m.referrals_entry_withheld(), ref: null };
}

async function referralOf(db: Reader, id: string): Promise<ThreadView['referral']> {
	const decider = alias(users, 'decider');
	const [row] = await db
		.select({
			referral: referrals,
			askedBy: { id: users.id, name: users.name },
			decidedBy: { id: decider.id, name: decider.name }
		})
		.from(referrals)
		.innerJoin(users, eq(users.id, referrals.askedBy))
		.leftJoin(decider, eq(decider.id, referrals.decidedBy))
		.where(eq(referrals.id, id));
	if (!row) {
		throw new Error(`Referral ${id} is missing though its thread exists.`);
	}
	const { referral, askedBy, decidedBy } = row;
	return {
		id: referral.id,
		episodeId: referral.episodeId,
		service: referral.service,
		priority: referral.priority,
		question: referral.question,
		state: referral.state,
		reason: referral.reason,
		askedBy,
		askedAt: toRfc3339(referral.askedAt),
		decidedBy,
		decidedAt: referral.decidedAt === null ? null : toRfc3339(referral.decidedAt)
	};
}
