import { expect, type Browser, type BrowserContext, type Page } from '@playwright/test';
import { PASSWORD, SIGN_INS } from '../support/api';

export const PHONE = { width: 390, height: 844 };
export const DESK = { width: 1440, height: 900 };

/** A person at a browser of their own. `page` keeps the one page that they look at. */
export interface Seat {
	context: BrowserContext;
	page: Page;
	/** What the browser complained about; a journey ends with none. */
	complaints: string[];
}

/** Somebody's browser, signed in on the sign-in page as a person would. */
export async function seat(
	browser: Browser,
	url: string,
	who: keyof typeof SIGN_INS | null,
	viewport = DESK
): Promise<Seat> {
	const context = await browser.newContext({ viewport, baseURL: url, reducedMotion: 'reduce' });
	const page = await context.newPage();
	const complaints: string[] = [];
	page.on('pageerror', (error) => complaints.push(error.message));
	page.on('console', (message) => {
		if (message.type() === 'error' && !isLostConnection(message.text())) {
			complaints.push(message.text());
		}
	});
	if (who) {
		await signIn(page, who);
	}
	return { context, page, complaints };
}

/** A journey that kills the server sees its browser complain about the lost connection; nothing else is forgiven. */
function isLostConnection(text: string): boolean {
	return /net::ERR_(CONNECTION_REFUSED|CONNECTION_RESET|INCOMPLETE_CHUNKED_ENCODING|EMPTY_RESPONSE|INTERNET_DISCONNECTED)/.test(
		text
	);
}

export async function signIn(page: Page, who: keyof typeof SIGN_INS): Promise<void> {
	await page.goto('/sign-in');
	await page.getByLabel(/e-mail/i).fill(SIGN_INS[who]);
	await page.getByLabel(/^password/i).fill(PASSWORD);
	await page.getByRole('button', { name: 'Sign in' }).click();
	await expect(page).toHaveURL(/\/loose-ends/);
	await expectConnected(page);
}

/** The page hears what happens: the state that every shell shows. */
export async function expectConnected(page: Page): Promise<void> {
	await expect(page.getByText('Connected', { exact: true })).toBeVisible();
}

/**
 * Hold back the scripts of the next pages, as a slow machine on a slow network does: the page is painted and takes
 * what is typed, and nothing has taken it over yet. Answers the function that lets them go.
 */
export async function holdScripts(page: Page): Promise<() => void> {
	let release = (): void => {};
	const released = new Promise<void>((resolve) => (release = resolve));
	await page.route('**/_app/immutable/**/*.js', async (route) => {
		await released;
		await route.continue();
	});
	return release;
}
