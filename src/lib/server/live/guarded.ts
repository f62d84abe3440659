import { produce } from 'sveltekit-sse';
import { BEAT_MS } from '$lib/domain/live/beat';
import { log } from '../log';
import { toEmit, type Frame } from './frames';
import { Pipe } from './pipe';

export interface Sink {
	/** False once the client is gone. */
	send(frame: Frame): boolean;
	/** Wait until the reader has taken most of what was sent; false once the client is gone. For who sends much at once. */
	room(): Promise<boolean>;
	end(): void;
}

export interface StreamOptions {
	/** With whatever is sent, heartbeats included, goes an event that a page can hear. */
	beats?: boolean;
	/** Takes the connection away from a reader that does not read. */
	dropConnection?: () => void;
}

/**
 * One guarded stream over sveltekit-sse's `produce`. A throw in `start` or `stop` would bring the process down
 * and a slow reader would grow the heap without limit; neither can happen behind this wrapper.
 *
 * @param start called once with the sink; what it returns is called when the stream is over
 * @param beat called before each heartbeat; false ends the stream
 */
export function guardedStream(
	start: (sink: Sink) => () => void,
	beat: () => Promise<boolean>,
	{ beats = false, dropConnection = () => {} }: StreamOptions = {}
): Response {
	let stop = () => {};
	const pipe = new Pipe(beats, () => safely(dropConnection));
	const inner = produce(
		({ emit, lock }) => {
			const end = () => lock.set(false);
			const send = (frame: Frame) => !emit(...toEmit(frame)).error;
			const sink: Sink = { send, room: () => pipe.room(), end };
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
	return new Response(pipe.open(inner.body as ReadableStream<Uint8Array>), {
		headers: {
			'content-type': 'text/event-stream',
			'cache-control': 'no-store',
			// Nothing else is ever answered on this connection, so it can be taken away with the stream.
			connection: 'close',
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
