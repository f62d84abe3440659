import { chromium, type CDPSession, type Page } from '@playwright/test';
import { shellOrChromium } from '../../src/cli/lib/chromium.mjs';
import { admit, signInAs, type Client } from '../support/api';
import type { Product } from '../support/server';
import { figuresOf, shown } from './figures';

const PATIENTS = 60;
/** Every third of them has somebody asked, so that ends hang from the ropes. */
const ASKED_EVERY = 3;
const TIMES = 12;
/** Sixty lanes are drawn within this, ms, once their data have come; on a machine that does nothing else. */
export const LANES_LIMIT_MS = 100;

/** One time that somebody came to the ward, ms. */
interface Drawing {
	/** From the moment that its data have come to the picture with every row. */
	drawn: number;
	/** From the press in another page to that picture, the server's answer included. */
	wholeWay: number;
	/** What the page's one thread worked on all of it. */
	worked: number;
}

/**
 * A ward of sixty, drawn again and again in a real browser.
 * @returns how long the drawing itself took in the quickest quarter, ms
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
	const all = await drawings(page);
	await browser.close();
	const figures = figuresOf(all.map(({ drawn }) => drawn));
	console.log(shown(`the ward of ${PATIENTS}: its drawing`, figures));
	console.log(shown('the whole way to it', figuresOf(all.map(({ wholeWay }) => wholeWay))));
	console.log(shown('the work of the page on all of it', figuresOf(all.map(({ worked }) => worked))));
	return figures.p25;
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

async function drawings(page: Page): Promise<Drawing[]> {
	const session = await page.context().newCDPSession(page);
	await session.send('Performance.enable', { timeDomain: 'threadTicks' });
	await page.goto('/cover');
	await page.getByText('Connected', { exact: true }).waitFor();
	const places = page.getByRole('navigation', { name: 'Places' }).first();
	const found: Drawing[] = [];
	for (let time = 0; time <= TIMES; time += 1) {
		const before = await taskMs(session);
		const watch = await page.evaluateHandle(watchDrawing, PATIENTS);
		await places.getByRole('link', { name: 'Ward' }).click();
		const times = await watch.evaluate(({ painted }) => painted);
		found.push({ ...times, worked: (await taskMs(session)) - before });
		await places.getByRole('link', { name: 'Cover' }).click();
		await page.getByRole('heading', { name: 'On cover now' }).waitFor();
	}
	// The first fetches the page's script.
	return found.slice(1);
}

/**
 * Runs in the page, before the press. The data may have come before it, because they are fetched when the pointer comes
 * near; then the drawing begins with the press.
 */
function watchDrawing(patients: number): { painted: Promise<Pick<Drawing, 'drawn' | 'wholeWay'>> } {
	performance.clearResourceTimings();
	let pressed = 0;
	addEventListener('click', ({ timeStamp }) => (pressed = timeStamp), { capture: true, once: true });
	// Nothing in here has a name of its own: the program that runs this file would mark it in a way no page knows.
	const painted = new Promise<number>((resolve) => {
		const watch = new MutationObserver(() => {
			if (document.querySelectorAll('tbody tr').length >= patients) {
				watch.disconnect();
				// What is posted while a picture begins is heard as soon as it is made; a second picture would wait for the screen.
				const made = new MessageChannel();
				made.port1.onmessage = () => resolve(performance.now());
				requestAnimationFrame(() => made.port2.postMessage(null));
			}
		});
		watch.observe(document.body, { subtree: true, childList: true });
	});
	return {
		painted: painted.then((end) => {
			const data = performance
				.getEntriesByType('resource')
				.filter(({ name }) => name.includes('__data.json'))
				.map((entry) => (entry as PerformanceResourceTiming).responseEnd);
			return { drawn: end - Math.max(pressed, ...data), wholeWay: end - pressed };
		})
	};
}

async function taskMs(session: CDPSession): Promise<number> {
	const { metrics } = await session.send('Performance.getMetrics');
	return (metrics.find(({ name }) => name === 'TaskDuration')?.value ?? 0) * 1000;
}
