/** A first-come-first-served lock. `acquire` resolves to the function that releases it; calling it twice is harmless. */
export class Mutex {
	#tail: Promise<void> = Promise.resolve();

	async acquire(): Promise<() => void> {
		let open = () => {};
		const mine = new Promise<void>((resolve) => (open = resolve));
		const before = this.#tail;
		this.#tail = before.then(() => mine);
		await before;
		return open;
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
