/**
 * The present instant as the server sees it, ticking while somebody looks: server time at load plus what has
 * passed since. A device whose clock is wrong must not show a wrong age of an escalation.
 */
export class Ticking {
	now = $state(0);
	#serverNow: number;
	#loadedAt: number;

	constructor(serverNow: number) {
		this.#serverNow = serverNow;
		this.#loadedAt = typeof performance === 'undefined' ? 0 : performance.now();
		this.now = serverNow;
	}

	/** Tick every `everyMs`; answers the function that stops it. Browser only. */
	start(everyMs = 1_000): () => void {
		const timer = setInterval(() => (this.now = this.#reading()), everyMs);
		return () => clearInterval(timer);
	}

	/** Newer word from the server. */
	set(serverNow: number): void {
		this.#serverNow = serverNow;
		this.#loadedAt = performance.now();
		this.now = serverNow;
	}

	#reading(): number {
		return Math.round(this.#serverNow + performance.now() - this.#loadedAt);
	}
}
