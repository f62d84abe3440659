import type { StreamEvent } from '$lib/domain/live/events';

const RETRY_MS = 2_000;

/** Who listens to a stream. */
export interface Ears {
	change(event: StreamEvent, cursor: number): void;
	/** The log no longer goes back to where this stream wanted to go on. */
	reset(cursor: number): void;
	/** The stream lives; with the server's instant, milliseconds UTC. */
	beat(serverNow: number): void;
	/** The connection broke. The browser tries again by itself. */
	broke(): void;
	/** The server refuses, because the sign-in has ended; somebody else may have signed in since. */
	signedOut(): void;
}

/**
 * The browser's own EventSource over `GET /api/live`. That it is open proves nothing: a connection can be dead for
 * minutes without an error. So the server is asked for beats, and whoever listens judges by what was heard.
 */
export class LiveStream {
	#source: EventSource | null = null;
	#stopped = false;

	/**
	 * @param userId whose stream it is; the server refuses it while somebody else is signed in in this browser
	 * @param cursor where to go on from, whenever the stream is opened anew
	 */
	constructor(
		private readonly userId: string,
		private readonly cursor: () => number,
		private readonly ears: Ears
	) {}

	/** Open it; an older one is closed, dead or not. */
	open(): void {
		this.close();
		if (this.#stopped) {
			return;
		}
		const source = new EventSource(`/api/live?beats=1&as=${this.userId}&after=${this.cursor()}`);
		this.#source = source;
		source.addEventListener('change', ({ data, lastEventId }) =>
			this.ears.change(JSON.parse(data) as StreamEvent, Number(lastEventId))
		);
		source.addEventListener('reset', ({ lastEventId }) => this.ears.reset(Number(lastEventId)));
		source.addEventListener('beat', ({ data }) => this.ears.beat(Number(data)));
		source.onerror = () => {
			this.ears.broke();
			// A refusal closes it for good; a cut connection is retried by the browser itself.
			if (source.readyState === EventSource.CLOSED && source === this.#source) {
				void this.#refused(source);
			}
		};
	}

	close(): void {
		this.#source?.close();
		this.#source = null;
	}

	/** Close it and never open it again. */
	stop(): void {
		this.#stopped = true;
		this.close();
	}

	/** Refused: the sign-in ended or is another's, or the server is stopping. The first is told, the second waits for it. */
	async #refused(source: EventSource): Promise<void> {
		const signedIn = await whoIsSignedIn();
		if (source !== this.#source) {
			return;
		}
		if (signedIn !== 'not-known' && signedIn !== this.userId) {
			this.ears.signedOut();
			return;
		}
		setTimeout(() => source === this.#source && this.open(), RETRY_MS);
	}
}

/** The id of the person who is signed in in this browser, null for nobody. */
async function whoIsSignedIn(): Promise<string | null | 'not-known'> {
	try {
		const response = await fetch('/api/me', { cache: 'no-store' });
		if (response.ok) {
			return ((await response.json()) as { user: { id: string } }).user.id;
		}
		return response.status === 401 ? null : 'not-known';
	} catch {
		return 'not-known';
	}
}
