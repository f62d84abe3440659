import { buttonLook } from './button';

/** The look of the button that opens a menu: a quiet button, which stays sunk while its list is open. */
export const MENU_BUTTON = [...buttonLook('quiet', 'desk'), 'data-[state=open]:bg-sunk'];

/** A list that opens over the page, and one line of it, which is marked while pointer or keys are on it. */
export const LIST = 'z-50 rounded border-2 border-ink bg-raised p-1 text-ink';
export const LIST_ITEM =
	'flex min-h-touch cursor-pointer rounded-hair px-4 font-bold outline-none ' +
	'data-highlighted:bg-ink data-highlighted:text-canvas data-highlighted:forced-color-adjust-none ' +
	'data-disabled:cursor-default data-disabled:text-soft';
