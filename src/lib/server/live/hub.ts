import type { LiveEvent } from '$lib/domain/live/events';

/** A live event after commit, with its place in the log and the unit that may hear it. */
export interface LoggedEvent extends LiveEvent {
	cursor: number;
	/** The unit whose people may hear it: where the episode was then; null for events without an episode. */
	unitId: string | null;
}

type Listener = (event: LoggedEvent) => void;

const listeners = new Set<Listener>();

/** Hand committed events to every open stream of this process. A listener that throws does not stop the others. */
export function publish(events: LoggedEvent[]): void {
	for (const event of events) {
		for (const listener of [...listeners]) {
			try {
				listener(event);
			} catch {
				listeners.delete(listener);
			}
		}
	}
}

/** Listen until the returned function is called. */
export function listen(listener: Listener): () => void {
	listeners.add(listener);
	return () => listeners.delete(listener);
}

export function listenerCount(): number {
	return listeners.size;
}
