import { and, eq, gt, gte, inArray, lte, max, min, or } from 'drizzle-orm';
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

/**
 * Which ways out do not work, for the frame of every page: whoever relies on a call for help has to know. It is
 * derived from the attempts: in trouble since the first one that failed after the last that went through; and from the
 * probes, which see it while nothing is sent, and see it come back. Trouble
 * with mail is told to those who can do something about it.
 */
export async function troublesFor(reader: Reader, person: Person, now: number): Promise<Trouble[]> {
	const channels = CHANNELS.filter((channel) => channel !== 'mail' || seesToMail(person));
	const troubles = await Promise.all(channels.map((channel) => troubleOf(reader, channel, now)));
	const known = troubles.filter((trouble) => trouble !== null);
	// One gateway carries texts and calls: that it is down is said once.
	const texts = known.some(({ channel }) => channel === 'sms');
	return known.filter(({ channel }) => channel !== 'voice' || !texts);
}

function seesToMail(person: Person): boolean {
	return can(person, 'stray-text.settle') || can(person, 'account.manage');
}

async function troubleOf(reader: Reader, channel: ChannelName, now: number): Promise<Trouble | null> {
	const since =
		(await heldSince(reader, channel, now)) ??
		(await failingSince(reader, channel, now)) ??
		probedOf(channel).downSince;
	return since === null
		? null
		: { channel, since: toRfc3339(since), waiting: await countWaiting(reader, channel, now) };
}

/** Due, and there is no gateway at all. */
async function heldSince(reader: Reader, channel: ChannelName, now: number): Promise<number | null> {
	const [row] = await reader
		.select({ at: min(outbox.nextAt) })
		.from(outbox)
		.where(and(eq(outbox.state, 'held'), eq(outbox.channel, channel), lte(outbox.nextAt, now)));
	return row?.at ?? null;
}

async function failingSince(reader: Reader, channel: ChannelName, now: number): Promise<number | null> {
	const troubled = and(
		eq(outbox.channel, channel),
		inArray(outbox.state, ['ready', 'sending', 'failed']),
		inArray(outbox.stateReason, [...TROUBLE_REASONS]),
		gt(outbox.nextAt, now - FORGOTTEN_AFTER_MS)
	);
	// Nearly always there is none, and nothing more is asked.
	if ((await reader.$count(outbox, troubled)) === 0) {
		return null;
	}
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
				troubled,
				inArray(outboxAttempts.outcome, ['transient', 'unknown']),
				gte(outboxAttempts.endedAt, Math.max(worked?.at ?? 0, probedOf(channel).backAt ?? 0))
			)
		);
	return failed?.at ?? null;
}

async function countWaiting(reader: Reader, channel: ChannelName, now: number): Promise<number> {
	return reader.$count(
		outbox,
		and(
			eq(outbox.channel, channel),
			inArray(outbox.state, ['ready', 'sending', 'held']),
			or(lte(outbox.nextAt, now), gt(outbox.attempts, 0))
		)
	);
}
