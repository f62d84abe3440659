import type { GradeName } from './grades';
import { LINK } from './link';

export type ButtonVariant = 'main' | 'quiet' | 'on-ground' | 'alarm' | 'link';
export type ButtonSize = 'desk' | 'phone' | 'take';

const BASE =
	'inline-flex min-w-touch flex-wrap items-center justify-center gap-x-2 border-2 text-center transition-colors ' +
	'aria-disabled:cursor-default disabled:text-soft forced-colors:disabled:border-[GrayText] forced-colors:disabled:text-[GrayText]';

/** What is filled or has an edge looks, while it is shut, like a field that is shut. */
const EDGED = 'font-black disabled:border-rule disabled:bg-sunk';

const VARIANTS: Record<Exclude<ButtonVariant, 'alarm'> | GradeName, string> = {
	main: `${EDGED} border-ink forced-color-adjust-none bg-ink text-canvas hover:border-soft hover:bg-soft`,
	quiet: `${EDGED} border-ink bg-transparent text-ink hover:bg-sunk`,
	'on-ground': `${EDGED} border-ink bg-canvas text-ink hover:bg-sunk`,
	high: `${EDGED} border-high forced-color-adjust-none bg-high text-canvas hover:border-ink`,
	medium: `${EDGED} border-medium forced-color-adjust-none bg-medium text-canvas hover:border-ink`,
	low: `${EDGED} border-low forced-color-adjust-none bg-low text-canvas hover:border-ink`,
	link: `${LINK.text} border-transparent font-bold text-ink disabled:border-transparent disabled:bg-transparent`
};

const SIZES: Record<ButtonSize, string> = {
	desk: 'min-h-touch rounded py-2 text-body leading-5',
	phone: 'min-h-thumb rounded-phone py-3 text-row',
	take: 'min-h-24 w-full rounded-phone py-4 text-take'
};

/** Left and right of the words; those of a `link` begin where other text does. */
const SIDES: Record<ButtonSize, string> = { desk: 'px-5', phone: 'px-5', take: 'px-6' };

/** The look of a button. A grade counts for an `alarm` alone: a call is raised and taken in its own colour. */
export function buttonLook(variant: ButtonVariant, size: ButtonSize, grade: GradeName = 'high'): string[] {
	const sides = variant === 'link' ? 'px-0' : SIDES[size];
	return [BASE, SIZES[size], sides, VARIANTS[variant === 'alarm' ? grade : variant]];
}
