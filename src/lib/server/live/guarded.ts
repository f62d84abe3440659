import { produce } from 'sveltekit-sse';
import { BEAT_MS } from '$lib/domain/live/beat';
import { now } from '../clock';
import { log } from '../log';
import { beatBlock, rewriteBlock, takeBlocks, toEmit, type Frame } from './frames';

/** A reader that lets this much pile up is cut; it resumes where it stopped and never slows the others. */
export const MAX_QUEUED_BYTES = 256 * 1024;
const RETRY_MS = 1_000;

export interface Sink {
	/** False once the client is gone. */
	send(frame: Frame): boolean;
	end(): void;
}

/**
 * One guarded stream over sveltekit-sse's `produce`. A throw in `start` or `stop` would bring the process down
 * and a slow reader would grow the heap without limit; neither can happen behind this wrapper.
 *
 * @param start called once with the sink; what it returns is called when the stream is over
 * @param beat called before each heartbeat; false ends the stream
 * @param options `beats`: with whatever is sent, heartbeats included, goes an event that a page can hear
 */
export function guardedStream(
	start: (sink: Sink) => () => void,
	beat: () => Promise<boolean>,
	options: { beats?: boolean } = {}
): Response {
	let stop = () => {};
	const inner = produce(
		({ emit, lock }) => {
			const end = () => lock.set(false);
			const sink: Sink = { send: (frame) => !emit(...toEmit(frame)).error, end };
			const timer = setInterval(() => void heartbeat(beat, end), BEAT_MS);
			timer.unref();
			let close = () => {};
			try {
				close = start(sink);
			} catch (error) {
				log().error({ err: error }, 'live stream did not start');
				end();
			}
			stop = () => {
				clearInterval(timer);
				close();
			};
		},
		{ ping: BEAT_MS, stop: () => safely(() => stop()) }
	);
	const body = inner.body as ReadableStream<Uint8Array>;
	return new Response(bounded(body, options.beats ?? false), {
		headers: {
			'content-type': 'text/event-stream',
			'cache-control': 'no-store',
			'x-accel-buffering': 'no'
		}
	});
}

async function heartbeat(beat: () => Promise<boolean>, end: () => void): Promise<void> {
	try {
		if (!(await beat())) {
			end();
		}
	} catch (error) {
		log().error({ err: error }, 'live stream lost its check');
		end();
	}
}

function safely(work: () => void): void {
	try {
		work();
	} catch (error) {
		log().error({ err: error }, 'live stream did not stop cleanly');
	}
}

/** Pass blocks on at the reader's pace and count what waits. */
function bounded(inner: ReadableStream<Uint8Array>, beats: boolean): ReadableStream<Uint8Array> {
	const reader = inner.getReader();
	const encoder = new TextEncoder();
	const queue: Uint8Array[] = [encoder.encode(`retry: ${RETRY_MS}\n\n`)];
	let queued = 0;
	let over = false;
	let wake = () => {};

	const push = (block: string) => {
		const bytes = encoder.encode(block);
		queue.push(bytes);
		queued += bytes.byteLength;
		wake();
	};
	const finish = () => {
		over = true;
		wake();
	};
	const cut = async () => {
		finish();
		queue.length = 0;
		await reader.cancel().catch(() => {});
	};
	const copy = async () => {
		const decoder = new TextDecoder();
		let rest = '';
		for (;;) {
			const { done, value } = await reader.read();
			if (done || over) {
				return finish();
			}
			const taken = takeBlocks(rest + decoder.decode(value, { stream: true }));
			rest = taken.rest;
			taken.blocks.forEach((block) => push(rewriteBlock(block)));
			if (beats && taken.blocks.length > 0) {
				push(beatBlock(now()));
			}
			if (queued > MAX_QUEUED_BYTES) {
				log().warn({ queued }, 'live reader too slow, cut');
				return cut();
			}
		}
	};

	return new ReadableStream<Uint8Array>(
		{
			start() {
				copy().catch(() => finish());
			},
			async pull(controller) {
				while (queue.length === 0 && !over) {
					await new Promise<void>((resolve) => (wake = resolve));
				}
				const next = queue.shift();
				if (next) {
					queued = Math.max(0, queued - next.byteLength);
					controller.enqueue(next);
				} else {
					controller.close();
				}
			},
			cancel: cut
		},
		{ highWaterMark: 0 }
	);
}
