import { and, asc, eq, inArray, lte, ne, notInArray, or } from 'drizzle-orm';
import { db, type Reader } from '../db';
import { outbox } from '../db/schema';
import { CHANNELS, type ChannelName } from './channels/channel';
import { changing, messageEvent, type OutboxRow } from './change';

/** How long a claimed message belongs to its worker; longer than any attempt. The next start does not wait for it. */
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
	/** A channel that has a gateway and is not asked to wait. */
	channel: ChannelName;
	/** Calls for help alone, or all else alone. */
	urgent: boolean;
	/** Messages that this process is sending already, whatever their lease says after a jump of the clock. */
	inHand: readonly string[];
}

/** Ready or held and due, or left behind by a worker whose lease has ended. */
function isDue({ now, channel, urgent, inHand }: Claiming) {
	return and(
		eq(outbox.channel, channel),
		urgent ? eq(outbox.kind, 'escalation') : ne(outbox.kind, 'escalation'),
		notInArray(outbox.id, [...inHand]),
		or(
			and(inArray(outbox.state, ['ready', 'held']), lte(outbox.nextAt, now)),
			and(eq(outbox.state, 'sending'), lte(outbox.leaseUntil, now))
		)
	);
}

/**
 * Claim what is due, the longest due first, by a conditional update, so that of several workers only one gets each
 * message. Nothing is written, and no lock is taken, when nothing is due.
 */
export async function claimDue(claiming: Claiming): Promise<Claimed[]> {
	const { owner, now, room } = claiming;
	if (room <= 0 || !(await anyDue(db(), claiming))) {
		return [];
	}
	return changing(now, async (tx, events) => {
		const due = await tx
			.select()
			.from(outbox)
			.where(isDue(claiming))
			.orderBy(asc(outbox.nextAt), asc(outbox.id))
			.limit(room);
		const claimed: Claimed[] = [];
		for (const before of due) {
			const [row] = await tx
				.update(outbox)
				.set({ state: 'sending', leaseOwner: owner, leaseUntil: now + LEASE_MS })
				.where(and(eq(outbox.id, before.id), isDue(claiming)))
				.returning();
			if (row) {
				claimed.push({ row, interruptedAt: interruptedAt(before, now) });
				events.push(await messageEvent(tx, row, 'sending'));
			}
		}
		return claimed;
	});
}

function interruptedAt(row: OutboxRow, now: number): number | null {
	return row.state === 'sending' ? claimedAt(row, now) : null;
}

/** When a message that is being sent was claimed. */
export function claimedAt({ leaseUntil }: OutboxRow, now: number): number {
	return leaseUntil === null ? now : leaseUntil - LEASE_MS;
}

async function anyDue(reader: Reader, claiming: Claiming): Promise<boolean> {
	const [row] = await reader.select({ id: outbox.id }).from(outbox).where(isDue(claiming)).limit(1);
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
