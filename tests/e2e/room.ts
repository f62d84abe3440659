import type { Page } from '@playwright/test';

/** Other languages need more room than English: every word on the page grows by this share. */
export const LONGER = 0.4;

/**
 * Every text of the page in a pretended language: accents on the vowels, and longer by `LONGER`. Figures, codes and
 * what people typed themselves grow too, which is harder than any translation.
 */
export async function stretch(page: Page): Promise<number> {
	return page.evaluate((longer) => {
		const accents: Record<string, string> = { a: 'á', e: 'é', i: 'ï', o: 'ô', u: 'ü' };
		const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
		const texts: Text[] = [];
		for (let node = walker.nextNode(); node; node = walker.nextNode()) {
			const inCode = node.parentElement?.closest('script, style, noscript, svg');
			if (!inCode && node.nodeValue?.trim()) {
				texts.push(node as Text);
			}
		}
		for (const text of texts) {
			const words = text.data.replace(/[aeiou]/g, (vowel) => accents[vowel] ?? vowel);
			const more = Math.ceil(words.trim().length * longer);
			text.data = `${words}${'ábcdé ôpqü '.repeat(Math.ceil(more / 11)).slice(0, more)}`;
		}
		return texts.length;
	}, LONGER);
}

/** What sticks out of the page, hides its own words, or stands upon another's. */
export async function spoilt(page: Page): Promise<string[]> {
	return page.evaluate(() => {
		const found: string[] = [];
		const wordsOf = (each: Element) => each.textContent?.trim().replaceAll(/\s+/g, ' ').slice(0, 40);
		const seen = (each: Element) =>
			each.checkVisibility({ visibilityProperty: true, opacityProperty: true }) && !each.closest('.sr-only');
		/** Within something that scrolls by itself, which makes nothing else wider. */
		const scrolls = (each: Element | null): boolean =>
			each !== null && (getComputedStyle(each).overflowX !== 'visible' || scrolls(each.parentElement));
		if (document.documentElement.scrollWidth > window.innerWidth) {
			const beyond = [...document.querySelectorAll('body *')]
				.filter(
					(each) => each.getBoundingClientRect().right > window.innerWidth + 1 && !scrolls(each.parentElement)
				)
				.map((each) => `${each.localName}.${each.className}: ${wordsOf(each)}`);
			found.push(`the page is ${document.documentElement.scrollWidth} px wide`, ...beyond.slice(0, 8));
		}
		const said = 'button, a, label, legend, summary, h1, h2, h3, p, dt, dd, li, th, td, output';
		for (const each of document.querySelectorAll<HTMLElement>(said)) {
			const { overflowX, overflowY, textOverflow, webkitLineClamp } = getComputedStyle(each);
			const cut = [overflowX, overflowY].some((way) => way === 'hidden' || way === 'clip');
			const wide = each.scrollWidth > each.clientWidth + 1 || each.scrollHeight > each.clientHeight + 1;
			// The first lines of an entry, as a preview that leads to the whole, and what is only read aloud.
			const meant = webkitLineClamp !== 'none' || each.clientWidth <= 1;
			if ((cut || textOverflow === 'ellipsis') && wide && !meant && seen(each)) {
				found.push(`cut: ${wordsOf(each)}`);
			}
		}
		// Controls beside each other must not cover each other's words, and no words may leave their control.
		const controls = [...document.querySelectorAll<HTMLElement>('main :is(button, a, summary)')].filter(seen);
		// Line by line: of a link that goes on in the next line, no single box says where its words are.
		const lines = controls.map((each) => {
			const range = document.createRange();
			range.selectNodeContents(each);
			return { each, words: [...range.getClientRects()].filter(({ width }) => width > 0) };
		});
		// What stays in view lies over what is scrolled below it, as it should.
		const staysInView = (each: Element | null): boolean =>
			each !== null &&
			(/sticky|fixed/.test(getComputedStyle(each).position) || staysInView(each.parentElement));
		const upon = (one: DOMRect, other: DOMRect) =>
			Math.min(one.right, other.right) - Math.max(one.left, other.left) > 2 &&
			Math.min(one.bottom, other.bottom) - Math.max(one.top, other.top) > 4;
		for (const [at, one] of lines.entries()) {
			for (const other of lines.slice(at + 1)) {
				const apart = one.each.contains(other.each) || other.each.contains(one.each);
				const floats = [one, other].some(({ each }) => staysInView(each));
				if (!apart && !floats && one.words.some((line) => other.words.some((each) => upon(line, each)))) {
					found.push(`over each other: ${wordsOf(one.each)} | ${wordsOf(other.each)}`);
				}
			}
		}
		return found;
	});
}

/** All letters twice as large, as a reader may ask the browser for (WCAG 1.4.4); or as they were. */
export async function enlarge(page: Page, twice: boolean): Promise<void> {
	await page.evaluate((size) => (document.documentElement.style.fontSize = size), twice ? '200%' : '');
}
