/**
 * Lets one through for each turn of the event loop, first come, first served; who comes alone does not wait.
 *
 * The database works synchronously underneath, so a request that only asks it never gives the event loop back before
 * it is answered. Sixty that arrive in one read of the sockets would run as one long stretch, in which no stream
 * beats and no timer is heard. Behind the turnstile each stretch is one request long.
 */
export class Turnstile {
	readonly #waiting: (() => void)[] = [];
	#taken = false;

	/** Resolves when it is this caller's turn: at once when nobody has gone through in this turn. */
	pass(): Promise<void> {
		if (this.#taken) {
			return new Promise((resolve) => this.#waiting.push(resolve));
		}
		this.#take();
		return Promise.resolve();
	}

	#take(): void {
		this.#taken = true;
		setImmediate(() => {
			const next = this.#waiting.shift();
			this.#taken = false;
			if (next) {
				this.#take();
				next();
			}
		});
	}
}
