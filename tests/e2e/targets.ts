import type { Page } from '@playwright/test';

/** The least side of what a finger meets where hands are full or wet: at the bedside and on pages of a phone, px. */
export const FINGER = 44;
/** The least side of a target anywhere (WCAG 2.5.8), px. */
export const POINTER = 24;

/** What is pressed and is smaller than that, px a side. A link within a sentence is as tall as its line, and left out. */
export function smallTargets(page: Page, least: number): Promise<string[]> {
	return page.evaluate((least) => {
		const pressed = 'a[href], button, input:not([type=hidden]), select, textarea, summary, [role=button]';
		const seen = (each: Element) =>
			each.checkVisibility({ visibilityProperty: true, opacityProperty: true }) && !each.closest('.sr-only');
		/** The words of a tick or a radio button press it too; a link may be spread over the row it stands in. */
		const pressedWith = (each: HTMLElement): Element[] => {
			const ticks = each instanceof HTMLInputElement && /checkbox|radio/.test(each.type);
			const spread = getComputedStyle(each, '::after').position === 'absolute';
			return [
				each,
				...(ticks ? (each.labels ?? []) : []),
				...(spread && each.offsetParent ? [each.offsetParent] : [])
			];
		};
		const sizeOf = (each: HTMLElement) => {
			const boxes = pressedWith(each).map((part) => part.getBoundingClientRect());
			const side = (from: 'left' | 'top', to: 'right' | 'bottom') =>
				Math.max(...boxes.map((box) => box[to])) - Math.min(...boxes.map((box) => box[from]));
			return { width: side('left', 'right'), height: side('top', 'bottom') };
		};
		const inSentence = (each: HTMLElement) => {
			if (getComputedStyle(each).display !== 'inline') {
				return false;
			}
			let block = each.parentElement;
			while (block && getComputedStyle(block).display === 'inline') {
				block = block.parentElement;
			}
			return (block?.innerText.trim().length ?? 0) > each.innerText.trim().length + 1;
		};
		return [...document.querySelectorAll<HTMLElement>(pressed)]
			.filter((each) => seen(each) && !inSentence(each))
			.map((each) => ({ each, ...sizeOf(each) }))
			.filter(({ width, height }) => Math.min(width, height) < least - 0.5)
			.map(({ each, width, height }) => {
				const name = each.getAttribute('aria-label') ?? (each.textContent.trim() || each.outerHTML);
				return `${Math.round(width)} x ${Math.round(height)} px: ${name.replaceAll(/\s+/g, ' ').slice(0, 60)}`;
			});
	}, least);
}
