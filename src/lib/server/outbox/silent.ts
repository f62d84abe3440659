import { and, asc, eq, gt, inArray, isNotNull, lte } from 'drizzle-orm';
import { MINUTE, HOUR } from '$lib/domain/core/time';
import { readStatus } from '$lib/domain/messages/status';
import { db } from '../db';
import { outbox } from '../db/schema';
import { log } from '../log';
import { noteStatus } from '../messages/receive-status';
import { CHANNELS, type ChannelName, type Channels } from './channels/channel';

/** A message of which the gateway has not told the end by then is asked about. */
export const SILENT_AFTER_MS = 10 * MINUTE;
/** And again in this distance, for so long. Some networks never tell that a text arrived. */
const EVERY_MS = 10 * MINUTE;
const GIVE_UP_AFTER_MS = 2 * HOUR;
/** So many in one round, one after another: it is no hurry, and the gateway counts calls. */
const ROUND = 20;
/** How often it is looked whether something is silent. */
const LOOK_EVERY_MS = MINUTE;

/**
 * Asks the gateway about texts and calls that it has accepted and never told the end of: a callback may have been lost, and
 * with it that somebody was not reached. What it answers counts like a callback. When it was asked is kept in memory
 * alone; to ask once more after a restart does no harm.
 */
export class SilentMessages {
	readonly #asked = new Map<string, number>();
	#lookAt = 0;
	#round: Promise<number> | null = null;

	constructor(private readonly channels: Channels) {}

	/** One round at a time. @returns how many messages were asked about */
	ask(now: number): Promise<number> {
		this.#round ??= this.#ask(now).finally(() => (this.#round = null));
		return this.#round;
	}

	async #ask(now: number): Promise<number> {
		const askable = CHANNELS.filter((name) => this.channels[name]?.statusOf);
		if (askable.length === 0 || now < this.#lookAt) {
			return 0;
		}
		this.#lookAt = now + LOOK_EVERY_MS;
		try {
			const all = await silent(askable, now);
			const due = all.filter(({ id }) => now - (this.#asked.get(id) ?? 0) >= EVERY_MS);
			for (const { id, channel, providerId } of due.slice(0, ROUND)) {
				this.#asked.set(id, now);
				const told = (await this.channels[channel]?.statusOf?.(providerId)) ?? null;
				const status = told && readStatus(told.status);
				if (told && status) {
					await noteStatus(providerId, status, told.errorCode, now);
				}
			}
			this.#forget(now);
			return Math.min(due.length, ROUND);
		} catch (error) {
			log().error({ err: error }, 'asking about silent messages failed');
			return 0;
		}
	}

	#forget(now: number): void {
		for (const [id, at] of this.#asked) {
			if (now - at > GIVE_UP_AFTER_MS) {
				this.#asked.delete(id);
			}
		}
	}
}

interface Silent {
	id: string;
	channel: ChannelName;
	providerId: string;
}

/** Accepted, and long enough ago; those that became due too long ago are not asked about any more. */
async function silent(channels: ChannelName[], now: number): Promise<Silent[]> {
	const rows = await db()
		.select({ id: outbox.id, channel: outbox.channel, providerId: outbox.providerId })
		.from(outbox)
		.where(
			and(
				eq(outbox.state, 'accepted'),
				inArray(outbox.channel, channels),
				gt(outbox.nextAt, now - GIVE_UP_AFTER_MS),
				lte(outbox.sentAt, now - SILENT_AFTER_MS),
				isNotNull(outbox.providerId)
			)
		)
		.orderBy(asc(outbox.sentAt));
	return rows.flatMap(({ providerId, ...row }) => (providerId === null ? [] : [{ ...row, providerId }]));
}
