/** The look of what is switched on and off: a chip, and one of several choices. */
export const CHIP = {
	base: 'inline-flex min-h-touch min-w-touch items-center justify-center gap-2 rounded border-2 px-4 py-1.5 text-body leading-5',
	on: 'border-ink bg-raised font-black text-ink',
	off: 'border-rule bg-transparent font-bold text-soft hover:border-soft hover:text-ink'
} as const;
