/** The look of one of several parts of a page: its word over a thick line, in ink for the one in view. */
export const TAB =
	'min-h-touch grow basis-0 border-b-4 px-2 pb-1 text-center font-black sm:grow-0 sm:basis-28 ' +
	'border-rule text-soft hover:text-ink aria-selected:border-ink aria-selected:text-ink ' +
	'forced-colors:not-aria-selected:border-[Canvas]';
