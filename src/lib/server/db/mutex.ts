import { setImmediate as turn } from 'node:timers/promises';

/**
 * A first-come-first-served lock. `acquire` resolves to the function that releases it; calling it twice is harmless.
 * Between two holders the event loop turns once: the database works synchronously underneath, so that a row of
 * waiting writes would otherwise run as one and let nobody else in meanwhile.
 */
export class Mutex {
	#tail: Promise<void> = Promise.resolve();
	#holders = 0;

	async acquire(): Promise<() => void> {
		let open = () => {};
		const mine = new Promise<void>((resolve) => (open = resolve));
		const before = this.#tail;
		const waits = this.#holders > 0;
		this.#tail = before.then(() => mine);
		this.#holders += 1;
		await before;
		if (waits) {
			await turn();
		}
		let held = true;
		return () => {
			if (held) {
				held = false;
				this.#holders -= 1;
				open();
			}
		};
	}

	async run<T>(work: () => Promise<T>): Promise<T> {
		const release = await this.acquire();
		try {
			return await work();
		} finally {
			release();
		}
	}
}
