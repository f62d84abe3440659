import { and, eq, gt, gte, inArray, lte, max, min, or, sql, type SQL } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { toRfc3339 } from '$lib/domain/core/instant';
import { HOUR } from '$lib/domain/core/time';
import { TROUBLE_REASONS } from '$lib/domain/messages/outcome';
import type { Trouble } from '$lib/domain/messages/views';
import type { Reader } from '../db';
import { outbox, outboxAttempts } from '../db/schema';
import { CHANNELS, type ChannelName } from '../outbox/channels/channel';
import { probedOf } from '../outbox/probes';

/** Nothing has been tried for so long: whether it would work now, nobody can say. */
const FORGOTTEN_AFTER_MS = HOUR;
const WAITING = ['ready', 'sending', 'held'] as const;

/**
 * Which ways out do not work, for the frame of every page: whoever relies on a call for help has to know. It is
 * derived from the attempts: in trouble since the first one that failed after the last that went through; and from the
 * probes, which see it while nothing is sent, and see it come back. Trouble
 * with mail is told to those who can do something about it.
 */
export async function troublesFor(reader: Reader, person: Person, now: number): Promise<Trouble[]> {
	const states = await statesOf(reader, now);
	const channels = CHANNELS.filter((channel) => channel !== 'mail' || seesToMail(person));
	const troubles = await Promise.all(
		channels.map((channel) => troubleOf(reader, channel, states.get(channel) ?? NOTHING, now))
	);
	const known = troubles.filter((trouble) => trouble !== null);
	// One gateway carries texts and calls: that it is down is said once.
	const texts = known.some(({ channel }) => channel === 'sms');
	return known.filter(({ channel }) => channel !== 'voice' || !texts);
}

function seesToMail(person: Person): boolean {
	return can(person, 'stray-text.settle') || can(person, 'account.manage');
}

/** What the messages of a channel say of it. */
interface ChannelState {
	/** Since when messages are due and there is no gateway at all. */
	heldSince: number | null;
	/** How many met trouble in their last attempt. */
	troubled: number;
	waiting: number;
}

const NOTHING: ChannelState = { heldSince: null, troubled: 0, waiting: 0 };

/** Of all channels in one reading: every page asks. */
async function statesOf(reader: Reader, now: number): Promise<Map<string, ChannelState>> {
	const due = lte(outbox.nextAt, now);
	const waits = and(inArray(outbox.state, [...WAITING]), or(due, gt(outbox.attempts, 0)));
	const rows = await reader
		.select({
			channel: outbox.channel,
			heldSince: sql<
				number | null
			>`min(case when ${and(eq(outbox.state, 'held'), due)} then ${outbox.nextAt} end)`,
			troubled: sql<number>`sum(coalesce(${troubledAt(now)}, 0))`,
			waiting: sql<number>`sum(${waits})`
		})
		.from(outbox)
		.where(
			or(
				inArray(outbox.state, [...WAITING]),
				and(eq(outbox.state, 'failed'), gt(outbox.nextAt, now - FORGOTTEN_AFTER_MS))
			)
		)
		.groupBy(outbox.channel);
	return new Map(rows.map(({ channel, ...state }) => [channel, state]));
}

function troubledAt(now: number): SQL | undefined {
	return and(
		inArray(outbox.state, ['ready', 'sending', 'failed']),
		inArray(outbox.stateReason, [...TROUBLE_REASONS]),
		gt(outbox.nextAt, now - FORGOTTEN_AFTER_MS)
	);
}

async function troubleOf(
	reader: Reader,
	channel: ChannelName,
	{ heldSince, troubled, waiting }: ChannelState,
	now: number
): Promise<Trouble | null> {
	// Nearly always there is none, and nothing more is asked.
	const failing = troubled === 0 ? null : await failingSince(reader, channel, now);
	const since = heldSince ?? failing ?? probedOf(channel).downSince;
	return since === null ? null : { channel, since: toRfc3339(since), waiting };
}

async function failingSince(reader: Reader, channel: ChannelName, now: number): Promise<number | null> {
	const [worked] = await reader
		.select({ at: max(outboxAttempts.endedAt) })
		.from(outboxAttempts)
		.innerJoin(outbox, eq(outbox.id, outboxAttempts.messageId))
		.where(
			and(
				eq(outbox.channel, channel),
				inArray(outboxAttempts.outcome, ['accepted', 'permanent']),
				gt(outboxAttempts.endedAt, now - 24 * HOUR)
			)
		);
	const [failed] = await reader
		.select({ at: min(outboxAttempts.startedAt) })
		.from(outboxAttempts)
		.innerJoin(outbox, eq(outbox.id, outboxAttempts.messageId))
		.where(
			and(
				eq(outbox.channel, channel),
				troubledAt(now),
				inArray(outboxAttempts.outcome, ['transient', 'unknown']),
				gte(outboxAttempts.endedAt, Math.max(worked?.at ?? 0, probedOf(channel).backAt ?? 0))
			)
		);
	return failed?.at ?? null;
}
