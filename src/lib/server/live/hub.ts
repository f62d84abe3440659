import type { LiveEvent } from '$lib/domain/live/events';
import { log } from '../log';

/** A live event after commit, with its place in the log and the unit that may hear it. */
export interface LoggedEvent extends LiveEvent {
	cursor: number;
	/** The unit whose people may hear it: where the episode was then; null for events without an episode. */
	unitId: string | null;
}

type Listener = (event: LoggedEvent) => void;

/** Each listener with what tells its owner that it was dropped. */
const listeners = new Map<Listener, () => void>();
let dropped = 0;

/**
 * Hand committed events to every open stream of this process. A listener that throws does not stop the others; it is
 * dropped, and its owner is told: a stream that stays open and deaf would look like a quiet ward.
 */
export function publish(events: LoggedEvent[]): void {
	for (const event of events) {
		for (const [listener, onDropped] of [...listeners]) {
			try {
				listener(event);
			} catch (error) {
				drop(listener, onDropped, error);
			}
		}
	}
}

function drop(listener: Listener, onDropped: () => void, error: unknown): void {
	listeners.delete(listener);
	dropped += 1;
	log().error({ err: error }, 'live listener failed, dropped');
	try {
		onDropped();
	} catch (failed) {
		log().error({ err: failed }, 'dropped live listener did not end');
	}
}

/**
 * Listen until the returned function is called.
 * @param onDropped called when the listener has thrown and hears nothing any more
 */
export function listen(listener: Listener, onDropped: () => void = () => {}): () => void {
	listeners.set(listener, onDropped);
	return () => listeners.delete(listener);
}

/** How many listeners have thrown since the start of the process. */
export function droppedListeners(): number {
	return dropped;
}

export function listenerCount(): number {
	return listeners.size;
}
