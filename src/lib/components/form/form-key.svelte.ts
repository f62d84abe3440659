import { newKey } from './new-key';

/**
 * The key of one form, which makes sure that what is sent twice is done once. It stays while nobody knows what became
 * of the write, and is another as soon as the server has taken it, or a person says that it is another write.
 */
export class FormKey {
	#given: () => string;
	#own = $state<string | null>(null);

	/** @param given the key that the server made with the page, as it stands there now */
	constructor(given: () => string) {
		this.#given = given;
	}

	/** Under which the form is sent. */
	get current(): string {
		return this.#own ?? this.#given();
	}

	/** It is on its way: a page that is loaded anew meanwhile brings a new key, and this write keeps its own. */
	hold(): void {
		this.#own = this.current;
	}

	/** The next is another write. */
	renew(): void {
		this.#own = newKey();
	}
}
