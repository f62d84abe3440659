/** Something that has just happened and wants no answer. What wants one stays on the page as a notice. */
export interface Toast {
	readonly id: number;
	readonly text: string;
	/** How long it is shown, milliseconds. */
	readonly ms: number;
	/** A way back, for as long as it is shown. */
	readonly undo: { label: string; run: () => void } | null;
}

/** Long enough to be read twice; one with a way back stays for its own time. */
export const TOAST_MS = 6_000;

/**
 * The short messages of one page, oldest first. A new one does not push out an old one before its time; a person
 * who rests on them keeps them.
 */
export class Toasts {
	items = $state<Toast[]>([]);
	#next = 1;
	#held = false;
	#timers: Record<number, ReturnType<typeof setTimeout>> = {};

	/** Show a sentence for `ms` milliseconds. */
	show(text: string, { undo = null, ms = TOAST_MS }: { undo?: Toast['undo']; ms?: number } = {}): void {
		const id = this.#next++;
		const toast = { id, text, undo, ms };
		this.items.push(toast);
		this.#wait(toast);
	}

	/** Put one away. One that has gone already is left in peace. */
	close(id: number): void {
		clearTimeout(this.#timers[id]);
		delete this.#timers[id];
		this.items = this.items.filter((each) => each.id !== id);
	}

	/** Take the way back of a toast, once. */
	undo(toast: Toast): void {
		this.close(toast.id);
		toast.undo?.run();
	}

	/** Stop every timer while somebody reads or reaches for a way back. */
	hold(): void {
		this.#held = true;
		Object.values(this.#timers).forEach((timer) => clearTimeout(timer));
	}

	/** Give what is still there its own time again. */
	release(): void {
		this.#held = false;
		this.items.forEach((toast) => this.#wait(toast));
	}

	#wait({ id, ms }: Toast): void {
		clearTimeout(this.#timers[id]);
		if (this.#held) {
			return;
		}
		this.#timers[id] = setTimeout(() => this.close(id), ms);
	}
}
