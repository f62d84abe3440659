import { setImmediate as turn } from 'node:timers/promises';

/**
 * A first-come-first-served lock. `acquire` resolves to the function that releases it; calling it twice is harmless.
 * Before each holder the event loop turns once, even when nobody holds it: the database works synchronously
 * underneath, so that writes that arrive together would otherwise run as one and let nobody else in meanwhile, each
 * finding the lock free again.
 */
export class Mutex {
	#tail: Promise<void> = Promise.resolve();

	async acquire(): Promise<() => void> {
		let open = () => {};
		const mine = new Promise<void>((resolve) => (open = resolve));
		const before = this.#tail;
		this.#tail = before.then(() => mine);
		await before;
		await turn();
		let held = true;
		return () => {
			if (held) {
				held = false;
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
