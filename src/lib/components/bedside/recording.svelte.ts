import { problemWords, type ProblemWords } from '$lib/client/deeds.svelte';
import type { Recorded, Sent } from '$lib/client/sessions';
import type { SessionBody } from '$lib/domain/bedside/forms';
import type { ClearanceKind } from '$lib/domain/core/codes';
import type { BedsideSession } from './session.svelte';

type Send = (body: SessionBody, key: string) => Promise<Sent>;

/** Sending the session that is on the page, until the server has said yes or no. */
export class Recording {
	pending = $state(false);
	/** A try got no answer, and nobody knows whether it arrived. A first try under way is not that yet. */
	unanswered = $state(false);
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
		// Held before it leaves: a tab that is closed or reloaded meanwhile must send the very same again, for the
		// server may have recorded it by then.
		const tried = this.#session.draft.sent !== null;
		const body = this.#session.body();
		this.#session.hold(body);
		try {
			this.#take(await this.#send(body, this.#session.draft.key), tried);
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
		this.unanswered = false;
	}

	/** @param tried whether it had been sent before, without an answer */
	#take(sent: Sent, tried: boolean): void {
		switch (sent.kind) {
			case 'recorded':
				this.unanswered = false;
				this.recorded = sent.recorded;
				break;
			case 'unanswered':
				this.unanswered = true;
				break;
			case 'clearance-needed':
				this.#release();
				this.needed = sent.kinds;
				break;
			case 'refused':
				this.problem = problemWords(sent.problem);
				// Signed out, or too many requests: that says nothing about an earlier try which got no answer.
				if (tried && [401, 429].includes(sent.problem.status)) {
					this.unanswered = true;
				} else {
					this.#release();
				}
		}
	}

	/** The server said that nothing was recorded. */
	#release(): void {
		this.unanswered = false;
		this.#session.release();
	}
}
