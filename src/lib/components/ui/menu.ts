/** The look of the button that opens a menu: a quiet button, with the mark of something behind it. */
export const menuButton =
	'inline-flex min-h-touch min-w-touch items-center gap-2 rounded border-2 border-ink px-4 py-2 leading-5 font-black ' +
	'text-ink transition-colors hover:bg-sunk data-[state=open]:bg-sunk';
