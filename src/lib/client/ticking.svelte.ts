/**
 * The present instant as the server sees it, ticking while somebody looks: the newest word of the server plus what
 * has passed since. A device whose clock is wrong must not show a wrong age of an escalation, and one that slept
 * must not show the age from before its sleep.
 */
export class Ticking {
	now = $state(0);
	#serverNow: number;
	#since = elapsing();

	/** @param serverNow milliseconds UTC */
	constructor(serverNow: number) {
		this.#serverNow = serverNow;
		this.now = serverNow;
	}

	/** Tick every `everyMs`, and at once when the page comes into view; answers the function that stops it. Browser only. */
	start(everyMs = 1_000): () => void {
		const tick = () => (this.now = Math.round(this.#serverNow + this.#since()));
		const timer = setInterval(tick, everyMs);
		document.addEventListener('visibilitychange', tick);
		return () => {
			clearInterval(timer);
			document.removeEventListener('visibilitychange', tick);
		};
	}

	/** Newer word from the server, milliseconds UTC: its clock may have moved. */
	set(serverNow: number): void {
		this.#serverNow = serverNow;
		this.#since = elapsing();
		this.now = serverNow;
	}
}

/**
 * A function that says how many milliseconds have passed. The steady clock stands still while some devices sleep,
 * and the wall clock may be set back, so the one that went further is believed until the server speaks again.
 */
function elapsing(): () => number {
	if (typeof performance === 'undefined') {
		return () => 0;
	}
	const steady = performance.now();
	const wall = Date.now();
	return () => Math.max(performance.now() - steady, Date.now() - wall);
}
