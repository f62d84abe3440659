import { gzipSync } from 'node:zlib';
import type { Page } from '@playwright/test';

/**
 * How far a page may move while it loads, as Web Vitals measures it; they call 0.1 good, and half of it is asked for.
 * The device's own face stands in at the same measure, so that words keep their places; a line that only just fits may
 * still break otherwise where the face comes late, and moves all that is below it by its height, 20 of the 844 px of a
 * phone: two such lines are forgiven, something that comes in between is not.
 */
export const SHIFT = 0.05;

/** What each script of the build weighs after gzip, KiB, by its address: many pages load the same. */
const known = new Map<string, Promise<number>>();

/** Every address that the page has loaded something from so far, out of the browser's own store as well. */
export async function loadedFrom(page: Page): Promise<URL[]> {
	const addresses = await page.evaluate(() =>
		performance.getEntriesByType('resource').map(({ name }) => name)
	);
	return [...new Set(addresses)].map((address) => new URL(address));
}

/** The script that the page has loaded so far, KiB after gzip. */
export async function scriptWeight(page: Page): Promise<number> {
	const scripts = (await loadedFrom(page)).filter(({ pathname }) => pathname.endsWith('.js'));
	const weights = await Promise.all(scripts.map(({ href }) => weightOf(href)));
	return weights.reduce((sum, each) => sum + each, 0);
}

function weightOf(address: string): Promise<number> {
	const found =
		known.get(address) ??
		fetch(address).then(async (answer) => gzipSync(new Uint8Array(await answer.arrayBuffer())).length / 1024);
	known.set(address, found);
	return found;
}

/** Note from the first paint on how far a page moves; `shiftSoFar` reads it. */
export async function watchShift(page: Page): Promise<void> {
	await page.addInitScript(() => {
		const shifts: number[] = [];
		Object.assign(window, { shifts });
		new PerformanceObserver((list) =>
			list.getEntries().forEach((entry) => shifts.push((entry as unknown as { value: number }).value))
		).observe({ type: 'layout-shift', buffered: true });
	});
}

/** How far the page has moved so far, as Web Vitals measures it, once two more pictures of it were drawn. */
export function shiftSoFar(page: Page): Promise<number> {
	return page.evaluate(async () => {
		for (let drawn = 0; drawn < 2; drawn += 1) {
			await new Promise((resolve) => requestAnimationFrame(resolve));
		}
		return (window as unknown as { shifts: number[] }).shifts.reduce((sum, each) => sum + each, 0);
	});
}
