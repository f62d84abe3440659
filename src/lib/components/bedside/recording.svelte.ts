import { problemWords, type ProblemWords } from '$lib/client/deeds.svelte';
import type { Recorded, Sent } from '$lib/client/sessions';
import type { SessionBody } from '$lib/domain/bedside/forms';
import type { ClearanceKind } from '$lib/domain/core/codes';
import type { BedsideSession } from './session.svelte';

type Send = (body: SessionBody, key: string) => Promise<Sent>;

/** Sending the session that is on the page, until the server has said yes or no. */
export class Recording {
	pending = $state(false);
	/** What the server answered; null while it has recorded nothing. */
	recorded = $state.raw<Recorded | null>(null);
	/** Why the last try recorded nothing; null when it is not known that it did not. */
	problem = $state.raw<ProblemWords | null>(null);
	/** The clearances that the server missed at the last try. */
	needed = $state.raw<ClearanceKind[]>([]);
	readonly #session: BedsideSession;
	readonly #send: Send;

	constructor(session: BedsideSession, send: Send) {
		this.#session = session;
		this.#send = send;
	}

	/** Send it, or send it again as it was. Answers the recorded session, or null when there is none yet. */
	async send(): Promise<Recorded | null> {
		if (this.pending) {
			return null;
		}
		this.pending = true;
		this.problem = null;
		try {
			const body = this.#session.body();
			this.#take(await this.#send(body, this.#session.draft.key), body);
		} finally {
			this.pending = false;
		}
		return this.recorded;
	}

	/** Begin another session. */
	clear(): void {
		this.recorded = null;
		this.problem = null;
		this.needed = [];
	}

	#take(sent: Sent, body: SessionBody): void {
		switch (sent.kind) {
			case 'recorded':
				this.recorded = sent.recorded;
				break;
			case 'unanswered':
				this.#session.hold(body);
				break;
			case 'clearance-needed':
				this.#session.release();
				this.needed = sent.kinds;
				break;
			case 'refused':
				this.problem = problemWords(sent.problem);
				// Signed out, or too many requests: that says nothing about an earlier try which got no answer.
				if (![401, 429].includes(sent.problem.status)) {
					this.#session.release();
				}
		}
	}
}
