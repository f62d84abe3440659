/** The look of one of a few words side by side, of which one is in force. */
export const TOGGLE =
	'min-h-touch grow rounded border-2 border-transparent px-3 font-bold text-soft hover:text-ink ' +
	'aria-pressed:border-ink aria-pressed:font-black aria-pressed:text-ink ' +
	'forced-colors:not-aria-pressed:border-[Canvas]';
