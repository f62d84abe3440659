import { SECOND } from '$lib/domain/core/time';
import { log } from '../log';
import { changing } from './change';
import { CHANNELS, type ChannelName, type Channels } from './channels/channel';

/**
 * So often a gateway is asked whether it is there. It counts as gone from the second answer in a row that does not
 * come, so that one lost packet alarms nobody; with the eight seconds of an answer that is well within a minute.
 */
export const PROBE_EVERY_MS = 20 * SECOND;

/** What the probes know of a way out, milliseconds UTC. */
interface Probed {
	/** The first of the probes in a row that failed; null while it works. */
	failedAt: number | null;
	/** Whether that is known for certain: a second one has failed too. */
	isDown: boolean;
	/** When it was back after it had been gone; null where it never was. */
	backAt: number | null;
}

const UNKNOWN: Probed = { failedAt: null, isDown: false, backAt: null };
const probed = new Map<ChannelName, Probed>();

/** Since when a way out is gone although nothing is sent, and when it last came back. In memory: it is soon known anew. */
export function probedOf(channel: ChannelName): { downSince: number | null; backAt: number | null } {
	const { failedAt, isDown, backAt } = probed.get(channel) ?? UNKNOWN;
	return { downSince: isDown ? failedAt : null, backAt };
}

/** Forget what was probed, at the end of a worker: the next one may have other gateways. */
export function forgetProbes(): void {
	probed.clear();
}

/**
 * Asks the gateways now and then whether they are there, lightly and without sending anything: else nobody would learn
 * that one is down before a call for help has to go through it. Pages hear of it when it goes and when it comes back.
 */
export class Probes {
	#nextAt = 0;
	#round: Promise<void> | null = null;

	constructor(private readonly channels: Channels) {}

	/** One round at a time, and none before its time. */
	run(now: number): Promise<void> {
		if (this.#round === null && now >= this.#nextAt) {
			this.#nextAt = now + PROBE_EVERY_MS;
			this.#round = this.#all(now).finally(() => (this.#round = null));
		}
		return this.#round ?? Promise.resolve();
	}

	async #all(now: number): Promise<void> {
		await Promise.all(
			CHANNELS.map(async (name) => {
				const probe = this.channels[name]?.probe;
				if (probe) {
					await note(name, await probe(), now);
				}
			})
		).catch((error: unknown) => log().error({ err: error }, 'probing a gateway failed'));
	}
}

async function note(channel: ChannelName, works: boolean, now: number): Promise<void> {
	const before = probed.get(channel) ?? UNKNOWN;
	const after = works ? worksNow(before, now) : failsNow(before, now);
	probed.set(channel, after);
	if (after.isDown !== before.isDown) {
		await changing(now, (_tx, events) => {
			events.push({ topic: 'delivery', kind: works ? 'works' : 'fails', id: channel, episodeId: null });
			return Promise.resolve();
		});
	}
}

/** Only what the probes have seen go can they see come back: sending may fail where asking does not. */
function worksNow({ isDown, backAt }: Probed, now: number): Probed {
	return { failedAt: null, isDown: false, backAt: isDown ? now : backAt };
}

function failsNow({ failedAt, backAt }: Probed, now: number): Probed {
	return { failedAt: failedAt ?? now, isDown: failedAt !== null, backAt };
}
