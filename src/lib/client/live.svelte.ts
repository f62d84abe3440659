import { SILENCE_MS } from '$lib/domain/live/beat';
import type { StreamEvent } from '$lib/domain/live/events';
import { LiveStream, type Ears } from './live-stream';

const CHANNEL = 'ropewalk-live';
const LOCK = 'ropewalk-live-leader';
const WATCH_MS = 1_000;

/** What the tab with the stream tells the others; `hello` is a new tab that asks. */
type Message =
	| { kind: 'change'; cursor: number; event: StreamEvent }
	| { kind: 'reset'; cursor: number }
	| { kind: 'beat'; serverNow: number }
	| { kind: 'lost'; since: number | null }
	| { kind: 'signed-out' }
	| { kind: 'hello' };

/** For whom a page listens, and from where on. */
export interface Place {
	userId: string;
	/** The place in the log from before the page was read. */
	cursor: number;
}

/** Who is told what the stream brings. */
export interface Listener {
	heard(event: StreamEvent): void;
	/** Something may have been missed: everything on screen has to be read again. */
	lostTrack(): void;
	/** The server's instant, milliseconds UTC, as fresh as the network brought it. */
	told(serverNow: number): void;
}

/**
 * One live stream for all tabs of one person in a browser: browsers allow six connections to a host, and ten open tabs would use
 * them up. The tab that holds a lock keeps the stream and passes on what it hears; when it closes, another takes
 * the lock and goes on from the last cursor. Every tab judges for itself: it is connected while it hears beats or
 * events, and no other sign counts. Lock and channel are the person's own: a tab that was left open by somebody else
 * neither leads the tabs of who is signed in now, nor hears from them.
 */
export class LiveConnection {
	connected = $state(false);
	/** When the connection was lost, by the server's clock, milliseconds UTC; null when it was never up. */
	since = $state<number | null>(null);
	/** The device itself says that it has no network. */
	offline = $state(false);
	/** The sign-in has ended: nothing comes any more until somebody signs in again. */
	signedOut = $state(false);

	readonly #userId: string;
	#cursor: number;
	readonly #listener: Listener;
	#stream: LiveStream | null = null;
	#channel: BroadcastChannel | null = null;
	#stopped = new AbortController();
	/** When the last beat or event came, or the stream was last opened, by this device's clock. */
	#sign = 0;
	/** Server's clock minus this device's. */
	#offset = 0;

	constructor({ userId, cursor }: Place, listener: Listener) {
		this.#userId = userId;
		this.#cursor = cursor;
		this.#listener = listener;
	}

	/** Start listening; answers the function that stops it. Browser only. */
	start(): () => void {
		const { signal } = this.#stopped;
		this.#sign = Date.now();
		this.#channel = new BroadcastChannel(`${CHANNEL}:${this.#userId}`);
		this.#channel.onmessage = ({ data }: MessageEvent<Message>) => this.#receive(data);
		this.#say({ kind: 'hello' });
		const watcher = setInterval(() => this.#watch(), WATCH_MS);
		signal.addEventListener('abort', () => clearInterval(watcher));
		addEventListener('offline', () => this.#wentOffline(), { signal });
		addEventListener('online', () => this.#cameOnline(), { signal });
		addEventListener('pageshow', ({ persisted }) => persisted && this.#reopen(), { signal });
		document.addEventListener('visibilitychange', () => this.#watch(), { signal });
		if (!navigator.onLine) {
			this.#wentOffline();
		}
		void this.#lead();
		return () => this.#stop();
	}

	async #lead(): Promise<void> {
		const { signal } = this.#stopped;
		const hold = () =>
			new Promise<void>((resolve) => {
				this.#stream = new LiveStream(this.#userId, () => this.#cursor, this.#ears());
				this.#reopen();
				signal.addEventListener('abort', () => resolve());
			});
		// Without the lock (an old browser, an address without https) every tab keeps a stream of its own.
		const lock = `${LOCK}:${this.#userId}`;
		await (navigator.locks?.request(lock, { signal }, hold).catch(() => {}) ?? hold());
	}

	#ears(): Ears {
		return {
			change: (event, cursor) => this.#tell({ kind: 'change', cursor, event }),
			reset: (cursor) => this.#tell({ kind: 'reset', cursor }),
			beat: (serverNow) => this.#tell({ kind: 'beat', serverNow }),
			broke: () => this.#lose(Date.now()),
			signedOut: () => this.#tell({ kind: 'signed-out' })
		};
	}

	/** A connection dies without a word: silence is the sign, for the tab with the stream and for the others. */
	#watch(): void {
		// The device's clock may have been set back; what cannot be judged is opened anew.
		if (Math.abs(Date.now() - this.#sign) <= SILENCE_MS) {
			return;
		}
		this.#lose(this.#sign);
		if (!this.signedOut) {
			this.#reopen();
		}
	}

	#wentOffline(): void {
		this.offline = true;
		this.#stream?.close();
		this.#lose(Date.now());
	}

	#cameOnline(): void {
		this.offline = false;
		this.#reopen();
	}

	#reopen(): void {
		this.#sign = Date.now();
		this.#stream?.open();
	}

	/** Not connected since `at`, this device's clock. A tab without the stream says it of itself alone. */
	#lose(at: number): void {
		if (!this.connected) {
			return;
		}
		const lost: Message = { kind: 'lost', since: at + this.#offset };
		this.#receive(lost);
		if (this.#stream) {
			this.#say(lost);
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
				this.#live();
				this.#listener.heard(message.event);
				break;
			case 'reset':
				this.#cursor = message.cursor;
				this.#live();
				this.#listener.lostTrack();
				break;
			case 'beat':
				this.#offset = message.serverNow - Date.now();
				this.#live();
				this.#listener.told(message.serverNow);
				break;
			case 'lost':
				this.connected = false;
				this.since = message.since;
				break;
			case 'signed-out':
				this.connected = false;
				this.signedOut = true;
				break;
			case 'hello':
				this.#greet();
		}
	}

	/** Something came: the one thing that makes a tab connected. */
	#live(): void {
		this.#sign = Date.now();
		this.connected = true;
		this.since = null;
		this.offline = false;
		this.signedOut = false;
	}

	/** A new tab wants to know; and where it could be opened, somebody may have signed in again. */
	#greet(): void {
		if (!this.#stream) {
			return;
		}
		if (this.connected) {
			this.#say({ kind: 'beat', serverNow: Date.now() + this.#offset });
			return;
		}
		this.#say({ kind: 'lost', since: this.since });
		if (this.signedOut) {
			this.#reopen();
		}
	}

	#say(message: Message): void {
		this.#channel?.postMessage(message);
	}

	#stop(): void {
		this.#stream?.stop();
		this.#stopped.abort();
		this.#channel?.close();
		this.#channel = null;
	}
}
