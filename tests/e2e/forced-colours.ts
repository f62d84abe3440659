import type { Page } from '@playwright/test';

/**
 * What cannot be told any more where the reader's own few colours replace the page's (WCAG 1.4.11): a control whose
 * only edge was its ground, and a drawing whose lines have the colour of what lies below.
 */
export function lostInForcedColours(page: Page): Promise<string[]> {
	return page.evaluate(() => {
		const seen = (each: Element) =>
			each.checkVisibility({ visibilityProperty: true, opacityProperty: true }) && !each.closest('.sr-only');
		const nameOf = (each: Element) =>
			(each.getAttribute('aria-label') ?? (each.textContent.trim() || each.outerHTML))
				.replaceAll(/\s+/g, ' ')
				.slice(0, 50);
		const edged = (each: Element) => {
			const { borderTopStyle, borderTopWidth, borderBottomStyle, borderBottomWidth, outlineStyle } =
				getComputedStyle(each);
			const border = (style: string, width: string) => style !== 'none' && parseFloat(width) >= 1;
			return (
				border(borderTopStyle, borderTopWidth) ||
				border(borderBottomStyle, borderBottomWidth) ||
				outlineStyle !== 'none'
			);
		};
		/** Words that read as a link, or a picture of their own, need no edge. */
		const speaks = (each: Element) =>
			getComputedStyle(each).textDecorationLine.includes('underline') || each.querySelector('svg') !== null;
		const controls = [...document.querySelectorAll('main button, main input, main select, main textarea')];
		const edgeless = controls
			.filter(
				(each) => seen(each) && !each.matches('[type=hidden], [type=checkbox], [type=radio], [role=tab]')
			)
			.filter((each) => ![each, each.parentElement ?? each].some((one) => edged(one) || speaks(one)))
			.map((each) => `${each.localName} ${nameOf(each)} has no edge`);
		const sheet = document.body.appendChild(document.createElement('div'));
		sheet.style.backgroundColor = 'Canvas';
		const ground = getComputedStyle(sheet).backgroundColor;
		sheet.remove();
		const drawn = [...document.querySelectorAll('svg')].filter(seen);
		const unseen = drawn
			.filter((svg) => {
				const parts = [...svg.querySelectorAll('path, circle, line, rect, polyline, polygon, ellipse, text')];
				const shows = parts.some((part) => {
					const { stroke, fill, strokeWidth } = getComputedStyle(part);
					return [parseFloat(strokeWidth) > 0 ? stroke : 'none', fill].some(
						(paint) => paint !== 'none' && paint !== ground && paint !== 'rgba(0, 0, 0, 0)'
					);
				});
				return parts.length > 0 && !shows;
			})
			.map((svg) => `a drawing in ${nameOf(svg.parentElement ?? svg)} has the colour of its ground`);
		return [...new Set([...edgeless, ...unseen])];
	});
}
