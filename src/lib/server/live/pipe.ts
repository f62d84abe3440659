import { setImmediate as turn } from 'node:timers/promises';
import { now } from '../clock';
import { log } from '../log';
import { beatBlock, rewriteBlock, takeBlocks } from './frames';

/** A reader that lets this much pile up is cut; it resumes where it stopped and never slows the others. */
export const MAX_QUEUED_BYTES = 256 * 1024;
/** Who has much to send waits until no more than this is queued. */
export const ROOM_BYTES = 64 * 1024;
/** A reader that takes nothing for so long while somebody waits for room is cut, milliseconds. */
export const STALLED_MS = 10_000;
/** So long may the last of a stream that is over take to reach its reader, milliseconds. */
export const ENDING_MS = 500;
/** How soon an EventSource comes back, milliseconds. */
const RETRY_MS = 1_000;

type Outer = ReadableStreamDefaultController<Uint8Array>;

let cut = 0;

/** How many readers were cut since the start of the process. */
export function cutReaders(): number {
	return cut;
}

/**
 * Passes the blocks of one stream on at its reader's pace, and counts what waits. A reader that falls too far behind
 * is cut, and one that does not take the end of a stream in time loses its connection too: whoever writes to a socket
 * that nobody reads waits for ever, and never comes to see that the stream is over.
 */
export class Pipe {
	readonly #encoder = new TextEncoder();
	#queue: Uint8Array[] = [];
	#queued = 0;
	/** Blocks taken so far; a reader that takes none has stalled. */
	#taken = 0;
	#over = false;
	#ending: NodeJS.Timeout | null = null;
	#wakeReader = () => {};
	#wakeSender = () => {};
	#source: ReadableStreamDefaultReader<Uint8Array> | null = null;
	#outer: Outer | null = null;

	/**
	 * @param beats whether an event that a page can hear goes with whatever is sent
	 * @param dropConnection takes the connection away from the reader; called at most once, and maybe when it is gone
	 */
	constructor(
		private readonly beats: boolean,
		private readonly dropConnection: () => void
	) {}

	/** Start to pass on what `source` brings; called once. */
	open(source: ReadableStream<Uint8Array>): ReadableStream<Uint8Array> {
		const reader = source.getReader();
		this.#source = reader;
		this.#push(`retry: ${RETRY_MS}\n\n`);
		return new ReadableStream<Uint8Array>(
			{
				start: (outer) => {
					this.#outer = outer;
					this.#copy(reader).catch(() => this.#sourceEnded());
				},
				pull: (outer) => this.#pull(outer),
				cancel: () => this.#letGo()
			},
			{ highWaterMark: 0 }
		);
	}

	/**
	 * Wait until the reader has taken most of what was sent. One that takes nothing meanwhile is cut. For one sender
	 * at a time.
	 * @returns false when the stream is over
	 */
	async room(): Promise<boolean> {
		// What was sent just now is queued once everything that waits for this turn of the event loop has run.
		await turn();
		while (!this.#over && this.#queued > ROOM_BYTES) {
			const before = this.#taken;
			await this.#roomOrStall();
			if (!this.#over && this.#taken === before) {
				this.#cut('stalled');
			}
		}
		return !this.#over;
	}

	#roomOrStall(): Promise<void> {
		return new Promise((resolve) => {
			const timer = setTimeout(resolve, STALLED_MS).unref();
			this.#wakeSender = () => {
				clearTimeout(timer);
				resolve();
			};
		});
	}

	async #copy(reader: ReadableStreamDefaultReader<Uint8Array>): Promise<void> {
		const decoder = new TextDecoder();
		let rest = '';
		for (;;) {
			const { done, value } = await reader.read();
			if (this.#over) {
				return;
			}
			if (done) {
				return this.#sourceEnded();
			}
			const taken = takeBlocks(rest + decoder.decode(value, { stream: true }));
			rest = taken.rest;
			this.#passOn(taken.blocks);
			if (this.#queued > MAX_QUEUED_BYTES) {
				return this.#cut('too slow');
			}
		}
	}

	#passOn(blocks: string[]): void {
		blocks.forEach((block) => this.#push(rewriteBlock(block)));
		if (this.beats && blocks.length > 0) {
			this.#push(beatBlock(now()));
		}
	}

	#push(block: string): void {
		const bytes = this.#encoder.encode(block);
		this.#queue.push(bytes);
		this.#queued += bytes.byteLength;
		this.#wakeReader();
	}

	async #pull(outer: Outer): Promise<void> {
		while (this.#queue.length === 0 && !this.#over) {
			await new Promise<void>((resolve) => (this.#wakeReader = resolve));
		}
		const next = this.#queue.shift();
		if (next) {
			this.#queued -= next.byteLength;
			this.#taken += 1;
			outer.enqueue(next);
			if (this.#queued <= ROOM_BYTES) {
				this.#wakeSender();
			}
		} else if (this.#outer) {
			outer.close();
		}
	}

	/** Nothing more comes. What waits may still be read, but not at leisure. */
	#sourceEnded(): void {
		this.#finish();
		this.#ending = setTimeout(() => this.dropConnection(), ENDING_MS).unref();
	}

	/** The stream fails for its reader, what waits is thrown away, and the connection goes with it. */
	#cut(why: 'stalled' | 'too slow'): void {
		log().warn({ queued: this.#queued, why }, 'live reader cut');
		cut += 1;
		const outer = this.#outer;
		void this.#letGo();
		outer?.error(new Error(`The reader was cut: ${why}.`));
		this.dropConnection();
	}

	async #letGo(): Promise<void> {
		clearTimeout(this.#ending ?? undefined);
		this.#outer = null;
		this.#queue = [];
		this.#queued = 0;
		this.#finish();
		await this.#source?.cancel().catch(() => {});
	}

	#finish(): void {
		this.#over = true;
		this.#wakeReader();
		this.#wakeSender();
	}
}
