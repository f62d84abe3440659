/** The look of what reads as text and is pressed: a link, and the word that opens more. */
const TEXT = 'underline decoration-soft underline-offset-4 hover:decoration-ink hover:decoration-2';

/** Within a sentence, or in a row of its own as tall as a finger. */
export const LINK = { text: TEXT, row: `${TEXT} min-h-touch inline-flex items-center` } as const;
export type LinkVariant = keyof typeof LINK;
