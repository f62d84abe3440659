import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { Problem } from '$lib/domain/core/errors';
import { loadPerson } from '../auth/people';
import { db } from '../db';
import { log } from '../log';
import { guardedStream, type Sink, type StreamOptions } from './guarded';
import { listen, type LoggedEvent } from './hub';
import { canResume, currentCursor, eventsAfter } from './log';

/** Each open stream, with the question whether its person may still listen. */
const open = new Map<Sink, () => Promise<boolean>>();
let closing = false;

/** May this person hear that event? Decided anew for each event, with their role and units of now. */
export function mayHear(person: Person, event: LoggedEvent): boolean {
	if (event.userId) {
		return event.userId === person.id;
	}
	// That texts do not go out concerns everybody, and tells of nobody.
	if (event.topic === 'delivery') {
		return true;
	}
	if (event.unitId === null) {
		return false;
	}
	// What one may not read, one does not hear of either: a coordinator hears no session and no escalation.
	switch (event.topic) {
		case 'escalation':
			return can(person, 'escalation.read', { unitId: event.unitId });
		case 'alarm':
			return can(person, 'alarm.read', { unitId: event.unitId });
		case 'session':
			return can(person, 'session.read', { unitId: event.unitId });
		case 'episode':
		case 'referral':
		case 'thread':
		case 'clearance':
		case 'visit':
		case 'message':
		case 'account':
			return can(person, 'episode.read', { unitId: event.unitId });
	}
}

/** `beats` are for the product's own pages, which cannot see a heartbeat that is a comment. */
interface Listening extends StreamOptions {
	person: Person;
	/** Whether the sign-in or token behind it is still good; asked again at each heartbeat. */
	stillGood: () => Promise<boolean>;
	/** The cursor to resume from; null starts with what happens next. */
	after: number | null;
}

/** Open the live stream of one person. */
export function openStream({ person, stillGood, after, ...options }: Listening): Response {
	if (closing) {
		throw new Problem('not-ready', 'The server is stopping; try again in a few seconds.');
	}
	let current = person;
	const stillEntitled = async () => {
		const fresh = await loadPerson(db(), person.id);
		if (!fresh || !(await stillGood())) {
			return false;
		}
		current = fresh;
		return true;
	};
	const start = (sink: Sink) => {
		open.set(sink, stillEntitled);
		const feed = new Feed(sink, () => current, stillEntitled, person.id);
		const stopListening = listen(
			(event) => feed.offer(event),
			() => sink.end()
		);
		feed.replay(after).catch((error: unknown) => {
			log().error({ err: error }, 'live replay failed');
			sink.end();
		});
		return () => {
			stopListening();
			open.delete(sink);
		};
	};
	return guardedStream(start, stillEntitled, options);
}

/** Events read from the log at once. At some two hundred bytes each they are well below what may pile up. */
const REPLAY_BATCH = 500;

/** One client's events in order: first the replay, at the reader's pace, then live. */
class Feed {
	#waiting: LoggedEvent[] = [];
	#replaying = true;
	/** Something happened during the replay that it may not have read yet. */
	#missed = false;
	#busy = false;
	#last = 0;

	constructor(
		private readonly sink: Sink,
		private readonly person: () => Person,
		private readonly stillEntitled: () => Promise<boolean>,
		private readonly ownId: string
	) {}

	offer(event: LoggedEvent): void {
		if (this.#replaying) {
			// It is in the log, where the replay finds it: nothing may pile up behind a slow reader.
			this.#missed = true;
			return;
		}
		this.#waiting.push(event);
		if (!this.#busy) {
			void this.#drain();
		}
	}

	async replay(after: number | null): Promise<void> {
		const newest = await currentCursor(db());
		const kept = after === null || (await canResume(db(), after));
		this.#last = kept ? (after ?? newest) : newest;
		this.sink.send({ kind: kept ? 'cursor' : 'reset', cursor: this.#last });
		do {
			this.#missed = false;
			if (!(await this.#catchUp())) {
				return;
			}
		} while (this.#missed);
		this.#replaying = false;
	}

	/** @returns false once the client is gone */
	async #catchUp(): Promise<boolean> {
		for (;;) {
			const events = await eventsAfter(db(), this.#last, REPLAY_BATCH);
			if (events.length === 0) {
				return true;
			}
			for (const event of events) {
				await this.#pass(event);
			}
			if (!(await this.sink.room())) {
				return false;
			}
		}
	}

	async #drain(): Promise<void> {
		this.#busy = true;
		try {
			for (let event = this.#waiting.shift(); event; event = this.#waiting.shift()) {
				if (event.cursor > this.#last) {
					await this.#pass(event);
				}
			}
		} catch (error) {
			log().error({ err: error }, 'live stream failed');
			this.sink.end();
		} finally {
			this.#busy = false;
		}
	}

	async #pass(event: LoggedEvent): Promise<void> {
		this.#last = event.cursor;
		// The person's own account changed: new role, new units, disabled, signed out.
		if (event.topic === 'account' && event.userId === this.ownId && !(await this.stillEntitled())) {
			this.sink.end();
			return;
		}
		if (mayHear(this.person(), event)) {
			const { topic, kind, id, episodeId } = event;
			this.sink.send({ kind: 'change', cursor: event.cursor, event: { topic, kind, id, episodeId } });
		}
	}
}

export function openStreams(): number {
	return open.size;
}

/** Ask every stream whether it may go on, as its heartbeat does, and end those that may not. */
export async function endUnentitledStreams(): Promise<void> {
	for (const [sink, stillEntitled] of [...open]) {
		if (!(await stillEntitled())) {
			sink.end();
		}
	}
}

/** End every stream and open no more: a stopping server would otherwise wait for them for half a minute. */
export function endAllStreams(): void {
	closing = true;
	for (const sink of open.keys()) {
		sink.end();
	}
}
