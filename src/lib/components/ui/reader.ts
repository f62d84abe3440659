import { getContext, setContext } from 'svelte';
import type { Reader } from '$lib/format';

const KEY = Symbol('reader');

/**
 * Tell every `Time` below where and when it is read. Call it while a layout is set up, with a function, so that
 * a clock that ticks reaches them all.
 */
export function provideReader(reader: () => Reader): void {
	setContext(KEY, reader);
}

/**
 * Who reads: the zone of the hospital (or the patient) and the instant of now.
 *
 * @throws Error when no layout above provided one: a time in the wrong zone is worse than none
 */
export function useReader(): () => Reader {
	const reader = getContext<(() => Reader) | undefined>(KEY);
	if (!reader) {
		throw new Error('A time is shown where no reader is known: call provideReader in a layout above it.');
	}
	return reader;
}
