import { mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import type { Browser, Page } from '@playwright/test';
import { signInAs, type SIGN_INS } from '../support/api';

export type Who = keyof typeof SIGN_INS;

/** The instant of every picture, a Thursday afternoon: the clocks of server and browsers stand still. */
export const AT = '2030-05-16T13:41:00Z';

export const SIZES = {
	'390': { width: 390, height: 844 },
	'768': { width: 768, height: 1024 },
	'1440': { width: 1440, height: 900 }
} as const;
export type Size = keyof typeof SIZES;

/** A page that is longer is cut there, in px. */
const HIGHEST = 6000;

export const THEMES = ['day', 'night'] as const;
export type Theme = (typeof THEMES)[number];

/** Where all of them go; the repository keeps only those beside this folder. */
export const EVERY = 'docs/pictures/every';

export function freshFolder(): void {
	if (process.env.TEST_WORKER_INDEX === '0') {
		rmSync(EVERY, { recursive: true, force: true });
	}
	mkdirSync(EVERY, { recursive: true });
}

/** The browser of somebody with that role, or of nobody, in that theme, at the instant of the pictures. */
export async function lookAs(browser: Browser, url: string, who: Who | null, theme: Theme): Promise<Page> {
	const context = await browser.newContext({
		baseURL: url,
		colorScheme: theme === 'night' ? 'dark' : 'light',
		reducedMotion: 'reduce'
	});
	await context.clock.setFixedTime(new Date(AT));
	if (who) {
		const [name = '', value = ''] = ((await signInAs(url, who)).cookie ?? '').split('=');
		await context.addCookies([{ name, value, url }]);
	}
	return context.newPage();
}

/** The page stands: its letters are there, and it hears what happens. */
export async function settled(page: Page, who: string | null): Promise<void> {
	await page.evaluate(() => document.fonts.ready);
	if (who !== null) {
		await page.getByText('Connected', { exact: true }).first().waitFor();
	}
}

/** One picture of the whole page as it stands, named so that sizes and themes of a page lie beside each other. */
export async function shoot(page: Page, name: string, who: string, size: Size, theme: Theme): Promise<void> {
	const viewport = SIZES[size];
	await settled(page, who === 'nobody' ? null : who);
	await unroll(page);
	const file = `${wordsOf(name)}--${who}--${size}-${theme}.png`;
	await page.screenshot({ path: path.join(EVERY, file), animations: 'disabled' });
	await page.setViewportSize(viewport);
}

/** `/patients/[id]/level` as `patients-id-level`; no identifier, which is another one each time. */
function wordsOf(address: string): string {
	const words = address.replaceAll(/\/[0-9a-f-]{36}/g, '').replaceAll(/[^a-z0-9]+/gi, '-');
	return words.replaceAll(/^-|-$/g, '') || 'front';
}

/** As high as the page is, so that what stays in view stands at its edges and not across the middle. */
async function unroll(page: Page): Promise<void> {
	const { width, height } = page.viewportSize() ?? SIZES['390'];
	const whole = await page.evaluate(() => document.documentElement.scrollHeight);
	await page.setViewportSize({ width, height: Math.min(Math.max(height, whole), HIGHEST) });
	await page.evaluate(() => scrollTo(0, 0));
}
