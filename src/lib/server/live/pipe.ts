import { setImmediate as turn } from 'node:timers/promises';
import { now } from '../clock';
import { log } from '../log';
import { beatBlock, rewriteBlock, takeBlocks } from './frames';

/** A reader that lets this much pile up is cut; it resumes where it stopped and never slows the others. */
export const MAX_QUEUED_BYTES = 256 * 1024;
/** Who has much to send waits until no more than this is queued. */
const ROOM_BYTES = 64 * 1024;
/** So long may a reader take nothing while somebody waits for room. */
const STALLED_MS = 10_000;
const RETRY_MS = 1_000;

/**
 * Passes the blocks of one stream on at its reader's pace and counts what waits. A reader that falls too far behind
 * is cut: what waits is thrown away, the source is let go, and `onCut` takes the connection.
 */
export class Pipe {
	readonly #encoder = new TextEncoder();
	#queue: Uint8Array[] = [this.#encoder.encode(`retry: ${RETRY_MS}\n\n`)];
	#queued = 0;
	#over = false;
	/** Blocks taken so far; a reader that takes none has stalled. */
	#taken = 0;
	#wakeReader = () => {};
	#wakeWaiting = () => {};
	#source: ReadableStreamDefaultReader<Uint8Array> | null = null;

	/** @param beats with whatever is passed on, heartbeats included, goes an event that a page can hear */
	constructor(
		private readonly onCut: () => void,
		private readonly beats = false
	) {}

	/** Start to pass on; called once. */
	open(source: ReadableStream<Uint8Array>): ReadableStream<Uint8Array> {
		const reader = source.getReader();
		this.#source = reader;
		return new ReadableStream<Uint8Array>(
			{
				start: () => {
					this.#copy(reader).catch(() => this.#finish());
				},
				pull: (controller) => this.#pull(controller),
				cancel: () => this.#letGo()
			},
			{ highWaterMark: 0 }
		);
	}

	/** Resolves when there is room again, or the stream is over. A reader that takes nothing meanwhile is cut. */
	async room(): Promise<void> {
		// What was sent just now is queued when everything that waits for this turn of the event loop has run.
		await turn();
		while (!this.#over && this.#queued > ROOM_BYTES) {
			const before = this.#taken;
			await this.#tookSomething();
			if (this.#taken === before && !this.#over) {
				this.#cut('stalled');
			}
		}
	}

	#tookSomething(): Promise<void> {
		return new Promise((resolve) => {
			const timer = setTimeout(resolve, STALLED_MS);
			timer.unref();
			this.#wakeWaiting = () => {
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
			if (done || this.#over) {
				return this.#finish();
			}
			const taken = takeBlocks(rest + decoder.decode(value, { stream: true }));
			rest = taken.rest;
			taken.blocks.forEach((block) => this.#push(rewriteBlock(block)));
			if (this.beats && taken.blocks.length > 0) {
				this.#push(beatBlock(now()));
			}
			if (this.#queued > MAX_QUEUED_BYTES) {
				return this.#cut('too slow');
			}
		}
	}

	async #pull(controller: ReadableStreamDefaultController<Uint8Array>): Promise<void> {
		while (this.#queue.length === 0 && !this.#over) {
			await new Promise<void>((resolve) => (this.#wakeReader = resolve));
		}
		const next = this.#queue.shift();
		if (!next) {
			controller.close();
			return;
		}
		this.#queued = Math.max(0, this.#queued - next.byteLength);
		this.#taken += 1;
		controller.enqueue(next);
		this.#wakeWaiting();
	}

	#push(block: string): void {
		const bytes = this.#encoder.encode(block);
		this.#queue.push(bytes);
		this.#queued += bytes.byteLength;
		this.#wakeReader();
	}

	#finish(): void {
		this.#over = true;
		this.#wakeReader();
		this.#wakeWaiting();
	}

	#cut(why: 'stalled' | 'too slow'): void {
		log().warn({ queued: this.#queued, why }, 'live reader cut');
		void this.#letGo();
		this.onCut();
	}

	async #letGo(): Promise<void> {
		this.#finish();
		this.#queue = [];
		await this.#source?.cancel().catch(() => {});
	}
}
