/** Something that a story names before the deed that makes it was done. */
export class Later {
	#id: string | null = null;

	constructor(private readonly what: string) {}

	is(id: string): void {
		this.#id = id;
	}

	/** @throws Error when it does not exist yet: the story tells its deeds in the wrong order of time */
	get id(): string {
		if (this.#id === null) {
			throw new Error(`A story of the demonstration speaks of ${this.what} before it was made.`);
		}
		return this.#id;
	}
}
