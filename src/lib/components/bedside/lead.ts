import { tick } from 'svelte';
import { MOMENTS, type Moment } from '$lib/domain/bedside/codes';

/** The moment whose tab holds the element, or null when it stands elsewhere on the page. */
export function momentOfId(id: string): Moment | null {
	return MOMENTS.find((moment) => id.startsWith(`${moment}-`)) ?? null;
}

/** Lead eye and keyboard to an element once the page has drawn it; a number is selected, ready to be typed over. */
export async function leadTo(id: string): Promise<void> {
	await tick();
	const element = document.getElementById(id);
	element?.focus();
	if (element instanceof HTMLInputElement) {
		element.scrollIntoView({ block: 'center' });
		element.select();
	} else {
		element?.scrollIntoView();
	}
}

const AGAIN_MS = 15_000;

/** Try again when the network says it is back, and every few seconds besides; answers the function that stops it. */
export function tryAgain(send: () => void): () => void {
	const timer = setInterval(send, AGAIN_MS);
	addEventListener('online', send);
	return () => {
		clearInterval(timer);
		removeEventListener('online', send);
	};
}
