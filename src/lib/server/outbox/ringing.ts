import { and, eq, gt, isNotNull, ne, notExists, sql } from 'drizzle-orm';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import { MINUTE } from '$lib/domain/core/time';
import type { SmsStatus } from '$lib/domain/messages/status';
import { db } from '../db';
import { escalations, outbox, smsStatuses } from '../db/schema';
import { log } from '../log';
import { changing, messageEvent } from './change';
import type { Channel, Channels } from './channels/channel';

/** No telephone rings for so long. */
const RINGS_AT_MOST_MS = 2 * MINUTE;
/** In our words for what the gateway tells: whoever listens hears the end, and may press a digit. */
const PICKED_UP: SmsStatus = 'sent';

/**
 * Hangs up the telephones that still ring for a call that somebody else has taken: nobody should run for a bell that
 * asks nothing of them. One that was picked up is let be. A hanging-up that fails is tried again while it could ring.
 */
export class RingingTelephones {
	#round: Promise<number> | null = null;

	constructor(private readonly channels: Channels) {}

	/** One round at a time. @returns how many were hung up */
	hangUp(now: number): Promise<number> {
		this.#round ??= this.#hangUp(now).finally(() => (this.#round = null));
		return this.#round;
	}

	async #hangUp(now: number): Promise<number> {
		const { voice } = this.channels;
		try {
			return voice?.end ? await endAll(voice, now) : 0;
		} catch (error) {
			log().error({ err: error }, 'hanging up failed');
			return 0;
		}
	}
}

async function endAll(voice: Channel, now: number): Promise<number> {
	let ended = 0;
	for (const row of await needless(now)) {
		if (row.providerId !== null && (await voice.end?.(row.providerId))) {
			await noteEnded(row, now);
			ended += 1;
		}
	}
	return ended;
}

type Row = typeof outbox.$inferSelect;

/** What its gateway tells of it from now on moves it no further. Taken back within the moment, it rings again. */
async function noteEnded(row: Row, now: number): Promise<void> {
	await changing(now, async (tx, events) => {
		await tx
			.update(outbox)
			.set({ state: 'cancelled', stateReason: 'taken' })
			.where(and(eq(outbox.id, row.id), eq(outbox.state, 'accepted')));
		events.push(await messageEvent(tx, row, 'cancelled'));
	});
}

/** Telephones that ring, as far as is known, and are not needed any more. */
async function needless(now: number): Promise<Row[]> {
	const pickedUp = db()
		.select({ one: sql`1` })
		.from(smsStatuses)
		.where(and(eq(smsStatuses.providerId, outbox.providerId), eq(smsStatuses.status, PICKED_UP)));
	const rows = await db()
		.select({ message: outbox, escalation: escalations })
		.from(outbox)
		.innerJoin(escalations, eq(escalations.id, outbox.refId))
		.where(
			and(
				eq(outbox.channel, 'voice'),
				eq(outbox.state, 'accepted'),
				gt(outbox.sentAt, now - RINGS_AT_MOST_MS),
				isNotNull(outbox.providerId),
				ne(escalations.state, 'raised'),
				notExists(pickedUp)
			)
		);
	return rows.filter((row) => !asks(row)).map(({ message }) => message);
}

/** Does the call still ask something of whom the telephone rings for? The taker hears that it is theirs. */
function asks({
	message,
	escalation
}: {
	message: Row;
	escalation: typeof escalations.$inferSelect;
}): boolean {
	const { state, takenBy, passTo } = escalation;
	return (
		state === 'taken' && (takenBy === message.userId || passTo === message.userId || isSoughtAnew(escalation))
	);
}
