import { now } from '../clock';
import { onCommit } from '../effects';
import { newId } from '../ids';
import { log } from '../log';
import { attempt } from './attempt';
import { CHANNELS, type ChannelName, type Channels, type Sent } from './channels/channel';
import { changing } from './change';
import { claimDue, holdDue, type Claimed } from './claim';
import { takeBackForeign } from './interrupted';
import { forgetProbes, Probes } from './probes';
import { RingingTelephones } from './ringing';
import { SilentMessages } from './silent';

/**
 * So many messages are on their way at once, counted for each channel: a gateway that hangs takes neither the
 * server with it nor the other channels. `routine` is how far all but calls for help may fill a channel; the rest
 * of its places is kept for those.
 */
export const MAX_IN_FLIGHT: Record<ChannelName, { all: number; routine: number }> = {
	sms: { all: 5, routine: 3 },
	mail: { all: 4, routine: 3 },
	// A telephone rings for calls for help alone.
	voice: { all: 5, routine: 0 },
	push: { all: 5, routine: 3 }
};
const BEAT_MS = 1_000;
/** A server that stops waits no longer for a gateway; the lease then tells the next start that the end is unknown. */
const STOP_PATIENCE_MS = 9_000;
/**
 * A gateway that asks for time gets it from everything but calls for help, up to this. Each call waits for itself
 * alone, by its own schedule: the refusal of one message, or of one number, must not silence the next call.
 */
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
	readonly #inFlight = new Map<string, { channel: ChannelName; ended: Promise<void> }>();
	readonly #routinePausedUntil = new Map<ChannelName, number>();
	/** Whether the last attempt on a channel got through; not there before the first. */
	readonly #working = new Map<ChannelName, boolean>();
	readonly #silent: SilentMessages;
	readonly #ringing: RingingTelephones;
	readonly #probes: Probes;
	#asking: Promise<unknown> = Promise.resolve();
	#round: Promise<unknown> = Promise.resolve();
	#waking = false;
	#timer: NodeJS.Timeout | null = null;
	#stopped = true;
	#unregister = () => {};

	constructor(options: OutboxOptions) {
		this.#channels = options.channels;
		this.#silent = new SilentMessages(options.channels);
		this.#ringing = new RingingTelephones(options.channels);
		this.#probes = new Probes(options.channels);
		this.#owner = options.owner ?? newId();
		this.#now = options.now ?? now;
		this.#random = options.random ?? Math.random;
	}

	start(): void {
		this.#stopped = false;
		this.#unregister = onCommit(() => this.wake());
		this.#timer = setInterval(() => this.#beat(), BEAT_MS);
		this.#timer.unref();
		this.#round = this.#round.then(() => this.#takeBack());
		this.wake();
	}

	#beat(): void {
		this.wake();
		const at = this.#now();
		this.#asking = Promise.all([this.#silent.ask(at), this.#ringing.hangUp(at), this.#probes.run(at)]);
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
			// A round that began while places were taken says nothing of what is left: they may be free by its end.
			const allFree = this.#inFlight.size === 0;
			const found = await this.#fill();
			seen += found;
			if (this.#inFlight.size > 0) {
				await Promise.race(this.#endings());
			} else if (allFree && found === 0) {
				return seen;
			}
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
		await Promise.race([Promise.all([...this.#endings(), this.#asking]), patience]);
		forgetProbes();
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

	/** What was on its way when the process before was killed is due at once. */
	async #takeBack(): Promise<void> {
		try {
			const count = await takeBackForeign(this.#owner, this.#now());
			if (count > 0) {
				log().warn({ count }, 'messages of a killed worker taken back');
			}
		} catch (error) {
			// Their leases end by themselves within a minute.
			log().error({ err: error }, 'taking messages back failed');
		}
	}

	async #claim(): Promise<number> {
		const at = this.#now();
		const configured = CHANNELS.filter((name) => this.#channels[name]);
		let seen = await holdDue(at, configured);
		for (const channel of configured) {
			seen += await this.#claimOn(channel, true, at);
			if ((this.#routinePausedUntil.get(channel) ?? 0) <= at) {
				seen += await this.#claimOn(channel, false, at);
			}
		}
		return seen;
	}

	async #claimOn(channel: ChannelName, urgent: boolean, at: number): Promise<number> {
		const { all, routine } = MAX_IN_FLIGHT[channel];
		const claimed = await claimDue({
			owner: this.#owner,
			now: at,
			room: (urgent ? all : routine) - this.#countOn(channel),
			channel,
			urgent,
			inHand: [...this.#inFlight.keys()]
		});
		for (const message of claimed) {
			this.#inFlight.set(message.row.id, { channel, ended: this.#send(message) });
		}
		return claimed.length;
	}

	#countOn(channel: ChannelName): number {
		return [...this.#inFlight.values()].filter((sending) => sending.channel === channel).length;
	}

	#endings(): Promise<void>[] {
		return [...this.#inFlight.values()].map(({ ended }) => ended);
	}

	async #send(message: Claimed): Promise<void> {
		const { id, channel: name } = message.row;
		const channel = this.#channels[name];
		try {
			if (channel) {
				const sending = { owner: this.#owner, channel, now: this.#now, random: this.#random };
				const sent = await attempt(message, sending);
				this.#heed(name, sent);
				await this.#tell(name, sent);
			}
		} catch (error) {
			// The lease brings it back; whether it went out is then asked first.
			log().error({ message: id, err: error }, 'message attempt failed');
		} finally {
			this.#inFlight.delete(id);
			this.wake();
		}
	}

	/** Pages say when a way out does not work. They hear of each failure, and of the first success after one. */
	async #tell(name: ChannelName, sent: Sent | null): Promise<void> {
		if (sent === null) {
			return;
		}
		const works = sent.outcome.kind === 'accepted' || sent.outcome.kind === 'permanent';
		const known = this.#working.get(name) ?? false;
		this.#working.set(name, works);
		if (!works || !known) {
			await changing(this.#now(), (_tx, events) => {
				events.push({ topic: 'delivery', kind: works ? 'works' : 'fails', id: name, episodeId: null });
				return Promise.resolve();
			});
		}
	}

	#heed(name: ChannelName, sent: Sent | null): void {
		if (sent?.outcome.kind === 'transient' && sent.outcome.retryAfter !== null) {
			const pause = Math.min(sent.outcome.retryAfter, LONGEST_PAUSE_MS);
			this.#routinePausedUntil.set(name, this.#now() + pause);
		}
	}
}
