import { and, asc, eq, inArray, lte, notInArray, or, sql } from 'drizzle-orm';
import { db, type Reader } from '../db';
import { outbox } from '../db/schema';
import { CHANNELS, type ChannelName } from './channels/channel';
import { changing, messageEvent, type OutboxRow } from './change';

/** How long a claimed message belongs to its worker. Longer than any attempt; after a kill others wait so long. */
export const LEASE_MS = 60_000;

/** A message that is this worker's to send until its lease ends. */
export interface Claimed {
	row: OutboxRow;
	/** When an earlier worker began that never told how it ended: its attempt may have gone through. Null for none. */
	interruptedAt: number | null;
}

export interface Claiming {
	owner: string;
	now: number;
	/** At most so many. */
	room: number;
	/** Channels that have a gateway and are not asked to wait. */
	open: readonly ChannelName[];
	/** Messages that this process is sending already, whatever their lease says after a jump of the clock. */
	inHand: readonly string[];
}

/** Ready or held and due, or left behind by a worker whose lease has ended. */
function isDue(now: number, open: readonly ChannelName[], inHand: readonly string[]) {
	return and(
		inArray(outbox.channel, [...open]),
		notInArray(outbox.id, [...inHand]),
		or(
			and(inArray(outbox.state, ['ready', 'held']), lte(outbox.nextAt, now)),
			and(eq(outbox.state, 'sending'), lte(outbox.leaseUntil, now))
		)
	);
}

/** Calls for help go before reminders, and mails last; within each the longest due first. */
const urgency = sql`case ${outbox.kind} when 'escalation' then 0 when 'mail' then 2 else 1 end`;

/**
 * Claim what is due by a conditional update, so that of several workers only one gets each message. Nothing is
 * written, and no lock is taken, when nothing is due.
 */
export async function claimDue(claiming: Claiming): Promise<Claimed[]> {
	const { owner, now, room, open, inHand } = claiming;
	if (room <= 0 || open.length === 0 || !(await anyDue(db(), claiming))) {
		return [];
	}
	return changing(now, async (tx, events) => {
		const due = await tx
			.select()
			.from(outbox)
			.where(isDue(now, open, inHand))
			.orderBy(urgency, asc(outbox.nextAt), asc(outbox.id))
			.limit(room);
		const claimed: Claimed[] = [];
		for (const before of due) {
			const [row] = await tx
				.update(outbox)
				.set({ state: 'sending', leaseOwner: owner, leaseUntil: now + LEASE_MS })
				.where(and(eq(outbox.id, before.id), isDue(now, open, inHand)))
				.returning();
			if (row) {
				claimed.push({ row, interruptedAt: interruptedAt(before, now) });
				events.push(await messageEvent(tx, row, 'sending'));
			}
		}
		return claimed;
	});
}

function interruptedAt({ state, leaseUntil }: OutboxRow, now: number): number | null {
	return state === 'sending' ? (leaseUntil ?? now) - LEASE_MS : null;
}

async function anyDue(reader: Reader, { now, open, inHand }: Claiming): Promise<boolean> {
	const [row] = await reader
		.select({ id: outbox.id })
		.from(outbox)
		.where(isDue(now, open, inHand))
		.limit(1);
	return row !== undefined;
}

/** Show what is due on a channel without a gateway as held, so that nobody thinks it was sent. Answers how many. */
export async function holdDue(now: number, configured: readonly ChannelName[]): Promise<number> {
	const closed = CHANNELS.filter((channel) => !configured.includes(channel));
	const due = and(inArray(outbox.channel, closed), eq(outbox.state, 'ready'), lte(outbox.nextAt, now));
	if (closed.length === 0 || (await db().$count(outbox, due)) === 0) {
		return 0;
	}
	return changing(now, async (tx, events) => {
		const held = await tx
			.update(outbox)
			.set({ state: 'held', stateReason: 'no gateway' })
			.where(due)
			.returning();
		for (const row of held) {
			events.push(await messageEvent(tx, row, 'held'));
		}
		return held.length;
	});
}
