import type { GradeName } from './grades';
import { LINK } from './link';

export type ButtonVariant = 'main' | 'quiet' | 'alarm' | 'link';
export type ButtonSize = 'desk' | 'phone' | 'take';

const BASE =
	'inline-flex min-w-touch flex-wrap items-center justify-center gap-x-2 border-2 text-center font-black transition-colors ' +
	'aria-disabled:cursor-default disabled:border-rule disabled:bg-sunk disabled:text-soft forced-colors:disabled:border-[GrayText] forced-colors:disabled:text-[GrayText]';

const VARIANTS: Record<Exclude<ButtonVariant, 'alarm'> | GradeName, string> = {
	main: 'border-ink forced-color-adjust-none bg-ink text-canvas hover:border-soft hover:bg-soft',
	quiet: 'border-ink bg-transparent text-ink hover:bg-sunk',
	high: 'border-high forced-color-adjust-none bg-high text-canvas hover:border-ink',
	medium: 'border-medium forced-color-adjust-none bg-medium text-canvas hover:border-ink',
	low: 'border-low forced-color-adjust-none bg-low text-canvas hover:border-ink',
	link: `${LINK.text} border-transparent font-bold text-ink disabled:border-transparent disabled:bg-transparent`
};

const SIZES: Record<ButtonSize, string> = {
	desk: 'min-h-touch rounded px-5 py-2 text-body leading-5',
	phone: 'min-h-thumb rounded-phone px-5 py-3 text-row',
	take: 'min-h-24 w-full rounded-phone px-6 py-4 text-take'
};

/** The look of a button. A grade counts for an `alarm` alone: a call is raised and taken in its own colour. */
export function buttonLook(variant: ButtonVariant, size: ButtonSize, grade: GradeName = 'high'): string[] {
	return [
		BASE,
		SIZES[size],
		variant === 'link' ? 'px-0!' : '',
		VARIANTS[variant === 'alarm' ? grade : variant]
	];
}
