/** The look of one of several parts or places: its word over a thick line. */
export const TAB =
	'min-h-touch grow basis-0 border-b-4 px-2 pb-1 text-center font-black sm:grow-0 sm:basis-28';
