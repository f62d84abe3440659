/** The box around words that are switched on and off: a chip, and each answer of a `Choice`. */
export const SWITCH_BOX =
	'inline-flex min-h-touch min-w-touch items-center justify-center rounded border-2 py-1.5 leading-5';
/** While it is off. */
export const SWITCH_OFF = 'border-soft font-bold hover:border-ink hover:bg-sunk';

export const CHIP = {
	base: `${SWITCH_BOX} gap-2 text-body disabled:text-soft forced-colors:disabled:border-[GrayText] forced-colors:disabled:text-[GrayText]`,
	sides: { wide: 'px-4', narrow: 'px-2' },
	on: 'border-ink forced-color-adjust-none bg-ink font-black text-canvas disabled:border-soft disabled:bg-sunk',
	off: `${SWITCH_OFF} bg-transparent text-ink disabled:border-dashed disabled:bg-transparent`
} as const;
