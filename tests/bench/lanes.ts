import { chromium, type CDPSession, type Page } from '@playwright/test';
import { shellOrChromium } from '../../src/cli/lib/chromium.mjs';
import { admit, signInAs, type Client } from '../support/api';
import type { Product } from '../support/server';
import { figuresOf, shown } from './figures';

const PATIENTS = 60;
/** Every third of them has somebody asked, so that ends hang from the ropes. */
const ASKED_EVERY = 3;
const TIMES = 12;
/** Sixty lanes are drawn within this; ms of work of the page's one thread, on a machine that does nothing else. */
export const LANES_LIMIT_MS = 100;

/**
 * A ward of sixty, drawn again and again in a real browser: the work from the press to the picture.
 * @returns that of the one in the middle, ms
 */
export async function drawLanes(product: Product): Promise<number> {
	const [coordinator, surgeon] = await Promise.all([
		signInAs(product.url, 'coordinator'),
		signInAs(product.url, 'surgeon')
	]);
	await fillWard(coordinator, surgeon);
	const browser = await chromium.launch({ executablePath: shellOrChromium(), args: ['--no-sandbox'] });
	const context = await browser.newContext({ baseURL: product.url, viewport: { width: 1440, height: 900 } });
	const [name = '', value = ''] = (surgeon.cookie ?? '').split('=');
	await context.addCookies([{ name, value, url: product.url }]);
	const page = await context.newPage();
	const drawn = await drawings(page);
	await browser.close();
	const figures = figuresOf(drawn);
	console.log(shown(`the ward of ${PATIENTS} is drawn`, figures));
	return figures.p50;
}

async function fillWard(coordinator: Client, surgeon: Client): Promise<void> {
	const { items } = (await surgeon.get('/api/episodes?limit=100')).body;
	for (let n = items.length; n < PATIENTS; n += 1) {
		const id = await admit(coordinator, { level: 1 + (n % 6), betaBlocked: n % 2 === 0, rhythm: 'sinus' });
		if (n % ASKED_EVERY === 0) {
			const referral = { service: 'physiotherapy', priority: 'soon', question: 'Please begin.' };
			await surgeon.post(`/api/episodes/${id}/referrals`, referral);
		}
	}
}

/** What the page's thread worked each time somebody came to the ward from another page, ms. */
async function drawings(page: Page): Promise<number[]> {
	const session = await page.context().newCDPSession(page);
	await session.send('Performance.enable', { timeDomain: 'threadTicks' });
	await page.goto('/cover');
	await page.getByText('Connected', { exact: true }).waitFor();
	const places = page.getByRole('navigation', { name: 'Places' }).first();
	const worked: number[] = [];
	for (let time = 0; time <= TIMES; time += 1) {
		const before = await taskMs(session);
		await places.getByRole('link', { name: 'Ward' }).click();
		await page.waitForFunction((rows) => document.querySelectorAll('tbody tr').length >= rows, PATIENTS);
		await page.evaluate(
			() => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done)))
		);
		worked.push((await taskMs(session)) - before);
		await places.getByRole('link', { name: 'Cover' }).click();
		await page.getByRole('heading', { name: 'On cover now' }).waitFor();
	}
	// The first fetches the page's script.
	return worked.slice(1);
}

async function taskMs(session: CDPSession): Promise<number> {
	const { metrics } = await session.send('Performance.getMetrics');
	return (metrics.find(({ name }) => name === 'TaskDuration')?.value ?? 0) * 1000;
}
