import { expect, test, type Browser } from '@playwright/test';
import { admit, signInAs, type Client } from '../support/api';
import { itemsOf } from '../support/fakes';
import { startProduct, type Product } from '../support/server';
import { reply, textArrives, textsTo } from './fakes';
import { PHONE, seat, type Seat } from './people';

/** What becomes of a call for help when nobody opens the link: a reply takes it, or the chain goes on. */
const RONA = /Rona Ferris/;
const MINUTE = 60_000;

let product: Product;
let therapist: Client;

test.describe.configure({ mode: 'serial' });

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	therapist = await signInAs(product.url, 'therapist');
});
test.afterAll(() => product?.stop());

/** A patient of their own in that bed, and a high call about them. */
async function raise(bed: string): Promise<string> {
	const episodeId = await admit(await signInAs(product.url, 'coordinator'), { bed });
	const { body } = await therapist.post(`/api/episodes/${episodeId}/escalations`, {
		grade: 'high',
		situation: 'Systolic pressure fell from 128 to 108 on a rate-slowing drug.',
		background: 'Bypass.',
		assessment: 'Too much.',
		request: 'Please come.'
	});
	return String(body.id);
}

/** A browser that looks at the call from now on. */
async function watching(browser: Browser, id: string): Promise<Seat> {
	const watcher = await seat(browser, product.url, 'therapist', PHONE);
	await watcher.page.goto(`/escalations/${id}`);
	return watcher;
}

async function numberOf(owner: RegExp): Promise<string> {
	const phones = await itemsOf<{ number: string; owner: string | null }>(`${product.smsUrl}/phones`);
	return phones.find((phone) => owner.test(phone.owner ?? ''))?.number ?? '';
}

test('reply: TAKE and the code takes it for the person of that number, and everybody sees it', async ({
	browser
}) => {
	const id = await raise('R1');
	const watcher = await watching(browser, id);
	await expect(watcher.page.getByText(/nobody has it/i).first()).toBeVisible();
	const { body } = await textArrives(product.smsUrl, RONA, /bed R1\b/);
	const code = /TAKE (\w+)/.exec(body)?.[1] ?? '';

	// A word that is no TAKE takes nothing, and is told so.
	const number = await numberOf(RONA);
	await reply(product.smsUrl, number, 'On my way');
	await textArrives(product.smsUrl, RONA, /NOT taken/i);
	await expect(watcher.page.getByText(/nobody has it/i).first()).toBeVisible();

	await reply(product.smsUrl, number, `take ${code}`);
	await expect(watcher.page.getByText(/Rona Ferris has it/).first()).toBeVisible();
	await textArrives(product.smsUrl, RONA, /R1: it is yours/);
	const { body: call } = await therapist.get(`/api/escalations/${id}`);
	expect(call).toMatchObject({ state: 'taken', holder: { name: 'Rona Ferris' }, next: null });
	expect(watcher.complaints).toEqual([]);
	await watcher.context.close();
});

interface Told {
	step: number;
	post: string;
	name: string | null;
	at: string;
}

/** Who was told at which step; none of them before its time, nor long after. */
async function told(id: string): Promise<string[]> {
	const { body } = await therapist.get(`/api/escalations/${id}`);
	const { raisedAt, steps } = body as unknown as { raisedAt: string; steps: Told[] };
	for (const { step, at } of steps) {
		const late = (Date.parse(at) - Date.parse(raisedAt)) / 1000 - (DUE_SECONDS[step] ?? 0);
		expect(late).toBeGreaterThanOrEqual(0);
		expect(late).toBeLessThan(60);
	}
	return steps.map(({ step, post, name }) => `${step} ${post}: ${name}`);
}

/** Of a high call, after the raising; the fifth is the first repeat. Common practice, no published source. */
const DUE_SECONDS = [0, 120, 180, 480, 780];

test('wait: nobody takes it, the chain goes on by its times over a kill, and the page says who was told', async ({
	browser
}) => {
	test.setTimeout(120_000);
	const id = await raise('W1');
	const watcher = await watching(browser, id);
	await textArrives(product.smsUrl, RONA, /bed W1\b/);
	const first = ['0 nurse: Rona Ferris', '0 nurse-in-charge: Desmond Quaye'];
	expect(await told(id)).toEqual(first);

	await product.advance(2 * MINUTE);
	const again = ['1 nurse: Rona Ferris', '1 nurse-in-charge: Desmond Quaye'];
	expect(await told(id)).toEqual([...first, ...again]);
	await textArrives(product.smsUrl, RONA, /bed W1\b/, 2);
	expect(await textsTo(product.smsUrl, /Marta Lisowska/)).toEqual([]);

	await product.kill('SIGKILL');
	await product.restart();
	await product.advance(MINUTE);
	const physician = '2 physician: Marta Lisowska';
	expect(await told(id)).toEqual([...first, ...again, physician]);
	await textArrives(product.smsUrl, /Marta Lisowska/, /bed W1\b/);
	expect(await textsTo(product.smsUrl, /Hilde Castellane/)).toEqual([]);

	await product.advance(5 * MINUTE);
	expect((await told(id)).at(-1)).toBe('3 surgeon: Hilde Castellane');
	await textArrives(product.smsUrl, /Hilde Castellane/, /bed W1\b/);
	await expect(watcher.page.getByText(/Told: Hilde Castellane/).first()).toBeVisible({ timeout: 30_000 });

	// At its end it repeats to everybody, and every screen of the unit says so.
	await product.advance(5 * MINUTE);
	expect((await told(id)).slice(-4)).toEqual([
		'4 nurse: Rona Ferris',
		'4 nurse-in-charge: Desmond Quaye',
		'4 physician: Marta Lisowska',
		'4 surgeon: Hilde Castellane'
	]);
	await watcher.page.goto('/ward');
	await expect(watcher.page.getByText(/everybody was told and nobody has it/).first()).toBeVisible();
	await watcher.context.close();
});

test('still: the time that grows in the strip over a page moves nothing on any phone', async ({
	browser
}) => {
	await raise('S1');
	const watcher = await seat(browser, product.url, 'therapist', PHONE);
	const strip = watcher.page.getByRole('region', { name: 'Untaken escalations' }).getByRole('link');
	const line = strip.filter({ hasText: 'bed S1' });
	await expect(line).toContainText(/\d s, nobody has it yet/);
	const heights = async () => {
		const found = [];
		for (const width of [360, 390, 430, 480, 540, 600]) {
			await watcher.page.setViewportSize({ ...PHONE, width });
			found.push((await line.boundingBox())?.height);
		}
		return found;
	};
	const before = await heights();
	// Before everybody was told: what is said then is longer, and may move the page once.
	await product.advance(7 * MINUTE);
	await expect(line).toContainText(/7 min \d+ s, nobody/, { timeout: 30_000 });
	expect(await heights()).toEqual(before);
	await watcher.context.close();
});

test('expire: a link left open says that it has expired, not that the network is gone', async ({
	browser
}) => {
	const id = await raise('E1');
	const { body } = await textArrives(product.smsUrl, RONA, /bed E1\b/);
	const link = /https?:\S+\/t\/\S+/.exec(body)?.[0] ?? '';
	const phone = await seat(browser, product.url, null, PHONE);
	await phone.page.goto(link);
	await expect(phone.page.getByRole('button', { name: 'I take it' })).toBeVisible();
	await product.advance(13 * 60 * MINUTE);
	await expect(phone.page.getByText('This link opens nothing any more')).toBeVisible();
	await expect(phone.page.getByText(/No connection/)).toHaveCount(0);
	const reader = await signInAs(product.url, 'therapist');
	expect((await reader.get(`/api/escalations/${id}`)).body).toMatchObject({ state: 'raised' });
	await phone.context.close();
});

test('double tap: the second tap of "I take it" presses nothing that came beneath the finger', async ({
	browser
}) => {
	therapist = await signInAs(product.url, 'therapist');
	const id = await raise('D1');
	const { body } = await textArrives(product.smsUrl, RONA, /bed D1\b/);
	const phone = await seat(browser, product.url, null, PHONE);
	await phone.page.goto(/https?:\S+\/t\/\S+/.exec(body)?.[0] ?? '');
	// The second tap falls in the very blink in which the next button has come to stand there.
	await phone.page.evaluate(() => {
		const tap = (form: Element) =>
			form
				.closest('form')
				?.querySelector('button')
				?.dispatchEvent(new MouseEvent('click', { bubbles: true, cancelable: true, detail: 1 }));
		const watch = new MutationObserver(() => {
			const arrive = document.querySelector('input[name=deed][value=arrive]');
			if (arrive) {
				watch.disconnect();
				tap(arrive);
			}
		});
		watch.observe(document.body, { childList: true, subtree: true });
	});
	await phone.page.getByRole('button', { name: 'I take it' }).click();
	await phone.page.getByRole('button', { name: 'I am at the bedside' }).waitFor();
	await expect(phone.page.getByText('You have it').first()).toBeVisible();
	const { body: call } = await therapist.get(`/api/escalations/${id}`);
	expect(call).toMatchObject({ state: 'taken', arrivedAt: null, etaMinutes: null });
	// A tap of its own, a moment later, counts.
	await expect(async () => {
		await phone.page.getByRole('button', { name: 'I am at the bedside' }).click({ timeout: 1_000 });
		await expect(phone.page.getByText(/At the bedside since/)).toBeVisible({ timeout: 3_000 });
	}).toPass();
	await phone.context.close();
});
