import { expect, test, type Browser, type Page } from '@playwright/test';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { holdScripts, PHONE, seat } from './people';

/** What the network does with a posted form, for a while. */
type Fate = 'pass' | 'lose' | 'hold';

let product: Product;
let episodeId: string;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { PUBLIC_STYLE_PAGE: '1', RATE_LIMIT_SCALE: '100' } });
	episodeId = await admit(await signInAs(product.url, 'coordinator'), {});
});
test.afterAll(() => product?.stop());

/** Every form that a page posts from now on. */
function posts(page: Page): string[] {
	const posted: string[] = [];
	page.on('request', (request) => {
		if (request.method() === 'POST') {
			posted.push(request.postData() ?? '');
		}
	});
	return posted;
}

/** The page of one form, taken over by script, and a hand on its network. */
async function formPage(page: Page) {
	let fate: Fate = 'pass';
	let release = (): void => {};
	const released = new Promise<void>((resolve) => (release = resolve));
	await page.route('**/style/form?/ask', async (route) => {
		if (fate === 'lose') {
			return route.abort();
		}
		if (fate === 'hold') {
			await released;
		}
		return route.continue();
	});
	await page.goto(`${product.url}/style`);
	await page.getByRole('link', { name: 'A form in every way it can end' }).click();
	await expect(page).toHaveURL(/\/style\/form$/);
	await page.waitForLoadState('networkidle');
	return {
		posted: posts(page),
		question: page.getByLabel('Question'),
		ask: page.getByRole('button', { name: 'Ask' }),
		network: (next: Fate) => void (fate = next),
		release
	};
}

test('too short: the field says its limit, nothing is sent, and what was typed stays', async ({ page }) => {
	const { posted, question, ask } = await formPage(page);
	await question.fill('ab');
	await ask.click();
	await expect(page.getByText('Question has 2 characters, and the least is 3.')).toBeVisible();
	await expect(question).toHaveAttribute('aria-invalid', 'true');
	await expect(question).toHaveValue('ab');
	expect(posted).toEqual([]);
	await question.fill('abc');
	await ask.click();
	await expect(page.getByText('Asked with a-key-from-the-server.')).toBeVisible();
	expect(posted).toHaveLength(1);
});

for (const [typed, notice] of [
	['signed out', 'Not sent: your sign-in has run out'],
	['broken', 'No answer: this may not have arrived'],
	['forbidden', 'A therapist asks for this.']
] as const) {
	test(`answered by ${typed}: the page says so, and what was typed stays`, async ({ page }) => {
		const { question, ask, posted } = await formPage(page);
		await question.fill(typed);
		await ask.click();
		await expect(page.getByRole('alert').getByText(notice)).toBeVisible();
		await expect(question).toHaveValue(typed);
		expect(posted).toHaveLength(1);
	});
}

test('a lost network: what was typed stays, and the next press carries the same key', async ({ page }) => {
	const { question, ask, network, posted } = await formPage(page);
	network('lose');
	await question.fill('May walking go on?');
	await ask.click();
	await expect(page.getByRole('alert').getByText('No answer: this may not have arrived')).toBeVisible();
	await expect(question).toHaveValue('May walking go on?');
	network('pass');
	await ask.click();
	await expect(page.getByText('Asked with a-key-from-the-server.')).toBeVisible();
	expect(posted).toHaveLength(2);
});

test('words that were changed after they had arrived: nothing is lost, and nothing is doubled unasked', async ({
	browser
}) => {
	const { page, context, question } = await refers(browser);
	const refer = page.getByRole('button', { name: 'Refer', exact: true });
	const arrived = page.getByRole('alert').getByText('Not sent: an earlier version has arrived');
	await page.goto(`/patients/${episodeId}/refer`, { waitUntil: 'networkidle' });
	await page.route('**/refer', async (route) => {
		await route.fetch({ maxRedirects: 0 });
		await route.abort();
		await page.unroute('**/refer');
	});
	await question.fill('Please see to her stairs.');
	await refer.click();
	await expect(page.getByRole('alert').getByText('No answer: this may not have arrived')).toBeVisible();
	await question.fill('Please see to her stairs at home.');
	await refer.click();
	await expect(arrived).toBeVisible();
	await refer.click();
	await expect(arrived).toBeVisible();
	await expect(question).toHaveValue('Please see to her stairs at home.');
	expect(await askedOf('Please see to her stairs')).toHaveLength(1);
	await expect(page.getByRole('link', { name: 'See what is on record' })).toHaveAttribute(
		'href',
		`/patients/${episodeId}`
	);
	await page.getByRole('button', { name: 'Send this as well' }).click();
	await expect(page).toHaveURL(/\/threads\//);
	expect(await askedOf('Please see to her stairs')).toHaveLength(2);
	await context.close();
});

test('two presses are one form', async ({ page }) => {
	const { question, ask, network, release, posted } = await formPage(page);
	network('hold');
	await question.fill('May walking go on?');
	await ask.dblclick();
	await expect.poll(() => posted.length).toBe(1);
	release();
	await expect(page.getByText('Asked with a-key-from-the-server.')).toBeVisible();
	expect(posted).toHaveLength(1);
});

test('a form that is slow says so, moves nothing meanwhile, and says no more once it is answered', async ({
	page
}) => {
	const { question, ask, network, release } = await formPage(page);
	network('hold');
	await question.fill('May walking go on?');
	const before = await ask.boundingBox();
	await ask.click();
	await expect(page.getByRole('progressbar', { name: 'Sending' })).toBeVisible();
	await expect(ask).toHaveText(/Please wait/);
	expect((await ask.boundingBox())?.y).toBe(before?.y);
	release();
	await expect(page.getByText('Asked with a-key-from-the-server.')).toBeVisible();
	await expect(page.getByRole('progressbar')).toHaveCount(0);
});

test('a page that is slow to come says so, and the page that is left stays until it is there', async ({
	browser
}) => {
	const { page, context, complaints } = await seat(browser, product.url, 'nurse', PHONE);
	let release = (): void => {};
	const released = new Promise<void>((resolve) => (release = resolve));
	await page.route('**/ward/__data.json**', async (route) => {
		await released;
		await route.continue();
	});
	await page.getByRole('link', { name: 'Ward' }).last().click();
	await expect(page.getByRole('progressbar', { name: 'Loading' })).toBeVisible();
	await expect(page).toHaveURL(/\/loose-ends/);
	release();
	await expect(page).toHaveURL(/\/ward/);
	await expect(page.getByRole('progressbar')).toHaveCount(0);
	expect(complaints).toEqual([]);
	await context.close();
});

/** The referrals of this patient whose question begins so. */
async function askedOf(begins: string): Promise<unknown[]> {
	const { body } = await (await signInAs(product.url, 'surgeon')).get(`/api/episodes/${episodeId}`);
	const { referrals } = body as unknown as { referrals: { question: string }[] };
	return referrals.filter(({ question }) => question.startsWith(begins));
}

/** A person on the page that refers this patient. */
async function refers(browser: Browser) {
	const { page, context, complaints } = await seat(browser, product.url, 'surgeon', PHONE);
	return { page, context, complaints, question: page.getByLabel('What you ask') };
}

test('refer: an empty question is named beside its field before anything is sent', async ({ browser }) => {
	const { page, context, complaints, question } = await refers(browser);
	const release = await holdScripts(page);
	await page.goto(`/patients/${episodeId}/refer`, { waitUntil: 'commit' });
	await question.fill(' '.repeat(3));
	release();
	const posted = posts(page);
	await page.waitForLoadState('networkidle');
	await expect(question).toHaveValue(' '.repeat(3));
	await page.getByRole('button', { name: 'Refer', exact: true }).click();
	await expect(page.getByText('What you ask is empty.')).toBeVisible();
	await expect(question).toBeFocused();
	expect(posted).toEqual([]);
	expect(complaints).toEqual([]);
	await context.close();
});

test('refer: two presses on a slow network are one referral', async ({ browser }) => {
	const { page, context, question } = await refers(browser);
	await page.goto(`/patients/${episodeId}/refer`, { waitUntil: 'networkidle' });
	await question.fill('Please begin to walk with her.');
	await page.getByRole('button', { name: 'Refer', exact: true }).dblclick();
	await expect(page).toHaveURL(/\/threads\//);
	expect(await askedOf('Please begin to walk')).toHaveLength(1);
	await context.close();
});
