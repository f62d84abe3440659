import { now } from '../clock';
import { onCommit } from '../effects';
import { newId } from '../ids';
import { log } from '../log';
import { attempt } from './attempt';
import { CHANNELS, type ChannelName, type Channels, type Sent } from './channels/channel';
import { claimDue, holdDue, type Claimed } from './claim';

/** So many messages are on their way at once: a gateway that hangs must not take the whole server with it. */
export const MAX_IN_FLIGHT = 5;
const BEAT_MS = 1_000;
/** A server that stops waits no longer for a gateway; the lease then tells the next start that the end is unknown. */
const STOP_PATIENCE_MS = 9_000;
/** A gateway that asks for time gets it from all messages, up to this. */
const LONGEST_PAUSE_MS = 60_000;

export interface OutboxOptions {
	channels: Channels;
	/** Names this worker in leases. */
	owner?: string;
	now?: () => number;
	random?: () => number;
}

/**
 * Sends what stands in the outbox: once a second, after every commit, and when asked to settle. What is due is in
 * the database, so a restart forgets nothing, and several workers share the work by leases.
 */
export class OutboxWorker {
	readonly #channels: Channels;
	readonly #owner: string;
	readonly #now: () => number;
	readonly #random: () => number;
	readonly #inFlight = new Map<string, Promise<void>>();
	readonly #pausedUntil = new Map<ChannelName, number>();
	#round: Promise<unknown> = Promise.resolve();
	#waking = false;
	#timer: NodeJS.Timeout | null = null;
	#stopped = true;
	#unregister = () => {};

	constructor(options: OutboxOptions) {
		this.#channels = options.channels;
		this.#owner = options.owner ?? newId();
		this.#now = options.now ?? now;
		this.#random = options.random ?? Math.random;
	}

	start(): void {
		this.#stopped = false;
		this.#unregister = onCommit(() => this.wake());
		this.#timer = setInterval(() => this.wake(), BEAT_MS);
		this.#timer.unref();
		this.wake();
	}

	/** Ask for a round soon. */
	wake(): void {
		if (this.#stopped || this.#waking) {
			return;
		}
		this.#waking = true;
		void this.#fill();
	}

	/**
	 * Attempt everything that is due and resolve when nothing is.
	 * @returns how many messages were seen to
	 */
	async settle(): Promise<number> {
		let seen = 0;
		for (;;) {
			seen += await this.#fill();
			if (this.#inFlight.size === 0) {
				return seen;
			}
			await Promise.race(this.#inFlight.values());
		}
	}

	/** Claim nothing more and wait, within limits, for what is on its way. */
	async stop(): Promise<void> {
		this.#stopped = true;
		this.#unregister();
		if (this.#timer) {
			clearInterval(this.#timer);
		}
		await this.#round;
		const patience = new Promise((resolve) => setTimeout(resolve, STOP_PATIENCE_MS).unref());
		await Promise.race([Promise.all(this.#inFlight.values()), patience]);
	}

	/** Claim as many as there is room for and set them going. Rounds never overlap. */
	#fill(): Promise<number> {
		const round = this.#round.then(async () => {
			this.#waking = false;
			try {
				return await this.#claim();
			} catch (error) {
				log().error({ err: error }, 'outbox round failed');
				return 0;
			}
		});
		this.#round = round;
		return round;
	}

	async #claim(): Promise<number> {
		const at = this.#now();
		const configured = CHANNELS.filter((name) => this.#channels[name] !== null);
		const held = await holdDue(at, configured);
		const claimed = await claimDue({
			owner: this.#owner,
			now: at,
			room: MAX_IN_FLIGHT - this.#inFlight.size,
			open: configured.filter((name) => (this.#pausedUntil.get(name) ?? 0) <= at),
			inHand: [...this.#inFlight.keys()]
		});
		for (const message of claimed) {
			this.#inFlight.set(message.row.id, this.#send(message));
		}
		return held + claimed.length;
	}

	async #send(message: Claimed): Promise<void> {
		const { id, channel: name } = message.row;
		const channel = this.#channels[name];
		try {
			if (channel) {
				const sending = { owner: this.#owner, channel, now: this.#now, random: this.#random };
				this.#heed(name, await attempt(message, sending));
			}
		} catch (error) {
			// The lease brings it back; whether it went out is then asked first.
			log().error({ message: id, err: error }, 'message attempt failed');
		} finally {
			this.#inFlight.delete(id);
			this.wake();
		}
	}

	#heed(name: ChannelName, sent: Sent | null): void {
		if (sent?.outcome.kind === 'transient' && sent.outcome.retryAfter !== null) {
			const pause = Math.min(sent.outcome.retryAfter, LONGEST_PAUSE_MS);
			this.#pausedUntil.set(name, this.#now() + pause);
		}
	}
}
