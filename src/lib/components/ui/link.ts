/** The look of what reads as text and is pressed: a link, and the word that opens more. */
const TEXT = 'underline decoration-soft underline-offset-4 hover:decoration-ink hover:decoration-2';
const QUIET = 'decoration-soft underline-offset-4 hover:underline hover:decoration-ink';
const ROW = 'min-h-touch inline-flex items-center';
const THUMB = 'max-md:min-h-touch inline-flex min-h-6 items-center';

/**
 * `text` stands within a sentence, `alone` by itself in a line of words, `row` by itself and as tall as a finger, `thumb`
 * as tall as one on a phone alone. `quiet` is for a name or a heading whose
 * place already says that it leads on: its line comes when it is pointed at. `place` is one of a list of places, the
 * one where the reader is underlined in hemp.
 */
export const LINK = {
	text: TEXT,
	row: `${TEXT} ${ROW}`,
	alone: `${TEXT} inline-block min-h-6`,
	thumb: `${TEXT} ${THUMB}`,
	quiet: QUIET,
	'quiet-thumb': `${QUIET} ${THUMB}`,
	'quiet-row': `${QUIET} ${ROW}`,
	place: `${QUIET} ${ROW} gap-3 aria-[current]:font-black aria-[current]:underline aria-[current]:decoration-hemp-ink aria-[current]:decoration-3`
} as const;
export type LinkVariant = keyof typeof LINK;

/** The words that are underlined within a `group` that is pressed as a whole. */
export const LINK_WORDS = 'decoration-soft underline-offset-4 group-hover:underline';
