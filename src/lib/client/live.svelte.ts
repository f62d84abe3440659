import type { StreamEvent } from '$lib/domain/live/events';

const CHANNEL = 'ropewalk-live';
const LOCK = 'ropewalk-live-leader';
const CHECK_MS = 20_000;
const RETRY_MS = 2_000;

type Message =
	| { kind: 'change'; cursor: number; event: StreamEvent }
	| { kind: 'reset'; cursor: number }
	| { kind: 'state'; connected: boolean; since: number | null }
	| { kind: 'signed-out' }
	| { kind: 'hello' };

/**
 * One live stream for all tabs of a browser: browsers allow six connections to a host, and ten open tabs would use
 * them up. The tab that holds a lock keeps the stream and passes on what it hears; when it closes, another takes
 * the lock and goes on from the last cursor. The stream itself resumes by the browser's own EventSource.
 */
export class LiveConnection {
	connected = $state(false);
	/** When the stream was lost, milliseconds UTC; null when it was never up. */
	since = $state<number | null>(null);
	/** The sign-in has ended: nothing comes any more until somebody signs in again. */
	signedOut = $state(false);

	#cursor: number;
	#source: EventSource | null = null;
	#channel: BroadcastChannel | null = null;
	#stopped = new AbortController();
	#checker: ReturnType<typeof setInterval> | undefined;

	constructor(
		cursor: number,
		private readonly heard: (event: StreamEvent) => void,
		private readonly lostTrack: () => void
	) {
		this.#cursor = cursor;
	}

	/** Start listening; answers the function that stops it. Browser only. */
	start(): () => void {
		this.#channel = new BroadcastChannel(CHANNEL);
		this.#channel.onmessage = ({ data }: MessageEvent<Message>) => this.#receive(data);
		this.#say({ kind: 'hello' });
		void this.#lead();
		return () => this.#stop();
	}

	async #lead(): Promise<void> {
		const { signal } = this.#stopped;
		const hold = () =>
			new Promise<void>((resolve) => {
				this.#open();
				this.#checker = setInterval(() => void this.#check(), CHECK_MS);
				addEventListener('online', () => this.#reopen(), { signal });
				signal.addEventListener('abort', () => resolve());
			});
		// Without the lock (an old browser, an address without https) every tab keeps a stream of its own.
		await (navigator.locks?.request(LOCK, { signal }, hold).catch(() => {}) ?? hold());
	}

	#open(): void {
		const source = new EventSource(`/api/live?after=${this.#cursor}`);
		this.#source = source;
		source.onopen = () => this.#setState(true);
		source.addEventListener('change', (event) =>
			this.#tell({
				kind: 'change',
				cursor: Number(event.lastEventId),
				event: JSON.parse(event.data) as StreamEvent
			})
		);
		source.addEventListener('reset', (event) =>
			this.#tell({ kind: 'reset', cursor: Number(event.lastEventId) })
		);
		source.onerror = () => {
			this.#setState(false);
			// A refusal closes it for good; a cut connection is retried by the browser itself.
			if (source.readyState === EventSource.CLOSED && !this.#stopped.signal.aborted) {
				void this.#refused(source);
			}
		};
	}

	/** Refused: the sign-in ended, or the server is stopping. The first is told, the second waits for it. */
	async #refused(source: EventSource): Promise<void> {
		const status = await fetch('/api/me', { cache: 'no-store' }).then(
			(response) => response.status,
			() => 0
		);
		if (status === 401) {
			this.#tell({ kind: 'signed-out' });
			return;
		}
		setTimeout(() => source === this.#source && this.#reopen(), RETRY_MS);
	}

	#reopen(): void {
		this.#source?.close();
		if (!this.#stopped.signal.aborted) {
			this.#open();
		}
	}

	/**
	 * A connection can be dead without an error, and heartbeats are comments, which pages do not see. So ask: no
	 * answer means not connected, and after that only a stream opened anew says connected again.
	 */
	async #check(): Promise<void> {
		const alive = await fetch('/healthz', { cache: 'no-store' }).then(
			(response) => response.ok,
			() => false
		);
		if (!alive) {
			this.#setState(false);
		} else if (!this.connected && !this.signedOut) {
			this.#reopen();
		}
	}

	/** The leader acts on what it heard and passes it on. */
	#tell(message: Message): void {
		this.#receive(message);
		this.#say(message);
	}

	#receive(message: Message): void {
		switch (message.kind) {
			case 'change':
				this.#cursor = Math.max(this.#cursor, message.cursor);
				this.heard(message.event);
				break;
			case 'reset':
				this.#cursor = message.cursor;
				this.lostTrack();
				break;
			case 'state':
				this.connected = message.connected;
				this.since = message.since;
				this.signedOut &&= !message.connected;
				break;
			case 'signed-out':
				this.signedOut = true;
				break;
			case 'hello':
				if (this.#source) {
					this.#say({ kind: 'state', connected: this.connected, since: this.since });
				}
		}
	}

	#setState(connected: boolean): void {
		if (connected === this.connected) {
			return;
		}
		this.#tell({ kind: 'state', connected, since: connected ? null : Date.now() });
	}

	#say(message: Message): void {
		this.#channel?.postMessage(message);
	}

	#stop(): void {
		clearInterval(this.#checker);
		this.#source?.close();
		this.#stopped.abort();
		this.#channel?.close();
		this.#channel = null;
	}
}
