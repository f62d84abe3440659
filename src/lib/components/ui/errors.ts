/** What is wrong with a field: one sentence, several, or nothing. */
export type Wrong = string | readonly string[] | null | undefined;

/** The sentences to show; an empty one is none. */
export function sentences(wrong: Wrong): string[] {
	return [wrong ?? []].flat().filter((sentence) => sentence !== '');
}
