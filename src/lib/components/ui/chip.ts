/** The look of what is switched on and off: a chip, and one of several choices. */
export const CHIP = {
	base: 'inline-flex min-h-touch min-w-touch items-center justify-center gap-2 rounded border-2 py-1.5 text-body leading-5 disabled:text-soft forced-colors:disabled:border-[GrayText] forced-colors:disabled:text-[GrayText]',
	sides: { wide: 'px-4', narrow: 'px-2' },
	on: 'border-ink forced-color-adjust-none bg-ink font-black text-canvas disabled:border-soft disabled:bg-sunk',
	off: 'border-soft bg-transparent font-bold text-ink hover:border-ink hover:bg-sunk disabled:border-dashed disabled:bg-transparent'
} as const;
