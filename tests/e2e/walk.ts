import { expect, type Browser, type Page } from '@playwright/test';
import { FIRST_KIB, MORE_KIB } from '../../src/cli/lib/weigh.mjs';
import { signInAs, type SIGN_INS } from '../support/api';
import { barriers, barriersAtDesk } from './access';
import { open, type VisitedPage } from './every-page';
import { expectConnected, PHONE } from './people';
import { spoilt, stretch } from './room';
import { loadedFrom, scriptWeight, SHIFT, shiftSoFar, watchShift } from './weight';

/** The patient's own page, and the one that keeps a form that came without script. */
const WITHOUT_SCRIPT = ['/p/[token]', '/sign-in/send'];

/** What was found at pages, by their names; nothing for a page that is as it should be. */
export type Faults = Record<string, string[]>;

/** The pages with a fault, and what it is. */
export function faultsIn(faults: Faults): [string, string[]][] {
	return Object.entries(faults).filter(([, what]) => what.length > 0);
}

/** Somebody of the demonstration, or whoever an address belongs to; nobody signed in. */
export type Who = keyof typeof SIGN_INS | { email: string; password: string } | null;

/** A browser that measures how pages move, of that person. */
export async function pageOf(browser: Browser, url: string, who: Who, viewport: typeof PHONE): Promise<Page> {
	const context = await browser.newContext({ viewport, baseURL: url, reducedMotion: 'reduce' });
	if (who) {
		const client =
			typeof who === 'string' ? await signInAs(url, who) : await signInAs(url, who.email, who.password);
		const [name = '', value = ''] = (client.cookie ?? '').split('=');
		await context.addCookies([{ name, value, url }]);
	}
	const page = await context.newPage();
	await watchShift(page);
	return page;
}

/** What the page at that address says to this person; null where they are not let in. */
export async function wordsFor(page: Page, address: string): Promise<string | null> {
	const answer = await page.context().request.get(address, { maxRedirects: 0 });
	return answer.status() === 200 ? wordsOfMain(await answer.text()) : null;
}

/** What the main part of a page says and offers, without what is new at each request: keys, and the time of day. */
function wordsOfMain(html: string): string {
	const main = /<main[\s\S]*<\/main>/.exec(html)?.[0] ?? html;
	return main
		.replaceAll(/ (?:value|id|for|href|aria-[a-z]+|datetime)="[^"]*"/g, '')
		.replaceAll(/<!--.*?-->|\d+/g, '');
}

/**
 * Opens a page and says what is wrong with it once it stands: something is from elsewhere, it moved, it is too heavy,
 * somebody cannot read or work it, longer words do not fit.
 */
export async function look(page: Page, one: VisitedPage): Promise<string[]> {
	await open(page, one);
	await (one.group === 'app' ? expectConnected(page) : page.waitForLoadState('networkidle'));
	const own = new URL(page.url()).origin;
	const foreign = (await loadedFrom(page)).filter(({ origin }) => origin !== own);
	const found = foreign.map(({ href }) => `loads ${href}`);
	const shift = await shiftSoFar(page);
	if (shift > SHIFT) {
		found.push(`moves by ${shift.toFixed(3)}`);
	}
	found.push(...(await overweight(page, one)));
	const onPhone = page.viewportSize()?.width === PHONE.width;
	found.push(...(await (onPhone ? barriers(page, one) : barriersAtDesk(page, one))));
	expect(await stretch(page), `${one.page} has words`).toBeGreaterThan(5);
	return [...found, ...(await spoilt(page))];
}

/** A page that should have script and loads none is broken. */
async function overweight(page: Page, one: VisitedPage): Promise<string[]> {
	const kib = await scriptWeight(page);
	const most = one.group !== 'app' || one.page === '/loose-ends' ? FIRST_KIB : FIRST_KIB + MORE_KIB;
	return kib > most || kib <= 1 !== WITHOUT_SCRIPT.includes(one.page)
		? [`loads ${kib.toFixed(1)} KiB of script`]
		: [];
}
