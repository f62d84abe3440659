import { expect, test, type Browser, type BrowserContextOptions, type Page } from '@playwright/test';
import { admit, signInAs, type Client, type SIGN_INS } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { faultsOf } from './accessible';
import { DESK, expectConnected, PHONE } from './people';

type Who = keyof typeof SIGN_INS;

let product: Product;
let episodeId: string;
const api: Partial<Record<Who, Client>> = {};

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	episodeId = await admit(await as('coordinator'), { level: 5 });
});
test.afterAll(() => product?.stop());

async function as(who: Who): Promise<Client> {
	return (api[who] ??= await signInAs(product.url, who));
}

/** A page of this person, signed in by cookie, so that it needs no script. */
async function pageOf(browser: Browser, who: Who, options: BrowserContextOptions = {}): Promise<Page> {
	const [name = '', value = ''] = ((await as(who)).cookie ?? '').split('=');
	const context = await browser.newContext({ baseURL: product.url, viewport: DESK, ...options });
	await context.addCookies([{ name, value, url: product.url }]);
	return context.newPage();
}

async function referred(): Promise<string> {
	const body = { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' };
	const answer = await (await as('surgeon')).post(`/api/episodes/${episodeId}/referrals`, body);
	return `/patients/${episodeId}/threads/${answer.body.threadId}`;
}

const field = (page: Page) => page.getByLabel('Write into the thread');
const alerts = (page: Page) => page.getByRole('alert').filter({ hasText: /./ });

test('without script: refer, accept, talk, ask, decide, and see who was faster', async ({ browser }) => {
	const plain = { javaScriptEnabled: false };
	const surgeon = await pageOf(browser, 'surgeon', plain);
	await surgeon.goto(`/patients/${episodeId}/refer`);
	await surgeon.getByRole('radio', { name: 'Speech therapy' }).check();
	await surgeon.getByRole('button', { name: 'Refer' }).click();
	await expect(alerts(surgeon)).toHaveText('What you ask is empty.');
	await expect(surgeon.getByRole('radio', { name: 'Speech therapy' })).toBeChecked();
	await surgeon.getByLabel(/What you ask/).fill('Voice is weak. Please look.');
	await surgeon.getByRole('button', { name: 'Refer' }).click();
	await expect(surgeon).toHaveURL(/threads/);

	const speech = await pageOf(browser, 'speech-therapist', plain);
	await speech.goto(surgeon.url());
	await speech.getByRole('button', { name: 'Accept', exact: true }).click();
	await expect(speech.getByText('Accepted.', { exact: true })).toBeVisible();
	await field(speech).fill('At three o’clock.');
	await speech.getByRole('button', { name: 'Send' }).click();
	await expect(speech.getByText('At three o’clock.')).toBeVisible();
	await expect(field(speech)).toHaveValue('');

	const therapist = await pageOf(browser, 'therapist', plain);
	await therapist.goto(`/patients/${episodeId}/clearances`);
	await therapist.getByLabel(/For what/).selectOption('stairs');
	await therapist.getByLabel(/What you ask/).fill('Six steps went well.');
	await therapist.getByRole('button', { name: 'Ask', exact: true }).click();
	await therapist.getByRole('link', { name: 'Stairs' }).click();

	const physician = await pageOf(browser, 'physician', plain);
	await surgeon.goto(therapist.url());
	await physician.goto(therapist.url());
	await surgeon.getByRole('radio', { name: 'two helpers' }).check();
	await surgeon.getByRole('button', { name: 'Clear, with two helpers' }).click();
	await expect(surgeon.getByText('Cleared with limits')).toBeVisible();
	await physician.getByRole('radio', { name: 'one helper' }).check();
	await physician.getByRole('button', { name: 'Clear, with one helper' }).click();
	await expect(alerts(physician)).toContainText('Hilde Castellane was faster');
	await expect(physician.getByText('with two helpers', { exact: true })).toBeVisible();
});

/** What the server has of this patient's board. */
const board = async () => (await (await as('nurse')).get(`/api/episodes/${episodeId}`)).body;

test('without script: a line is noted in and out', async ({ browser }) => {
	const page = await pageOf(browser, 'nurse', { javaScriptEnabled: false, viewport: PHONE });
	await page.goto(`/patients/${episodeId}`);
	await page.getByText('Note a line in, or the oxygen').click();
	await page.getByRole('button', { name: 'chest drain' }).click();
	const drain = page.getByRole('listitem').filter({ hasText: 'chest drain' });
	const out = drain.getByRole('button', { name: 'Out: chest drain' });
	await expect(out).toBeVisible();
	await expect(page).toHaveURL(new RegExp(`/patients/${episodeId}$`));
	expect((await board()).lines).toEqual(['chest-drain']);

	await out.click();
	await expect(out).toHaveCount(0);
	expect((await board()).lines).toEqual([]);
	await page.getByText('Out earlier').click();
	await expect(drain).toBeVisible();
});

test('without script: what is wrong behind a fold is seen when the page comes back, and stays as typed', async ({
	browser
}) => {
	const page = await pageOf(browser, 'nurse', { javaScriptEnabled: false, viewport: PHONE });
	await page.goto(`/patients/${episodeId}`);
	await page.getByText('Note a line in, or the oxygen').click();
	const oxygen = page.getByRole('textbox', { name: /^Oxygen/ });
	await oxygen.fill('a little');
	await page.getByRole('button', { name: 'Note the oxygen' }).click();
	await expect(oxygen).toBeVisible();
	await expect(oxygen).toHaveAttribute('aria-invalid', 'true');
	await expect(oxygen).toHaveValue('a little');
	await expect(page.getByRole('button', { name: 'Note it' })).toBeHidden();
	expect((await board()).oxygen).toBeNull();
});

test('noting a line leaves what is half typed beside it', async ({ browser }) => {
	const page = await pageOf(browser, 'nurse');
	await page.goto(`/patients/${episodeId}`);
	await expectConnected(page);
	await page.getByText('Note wound and breastbone').click();
	await page.getByText('Note a line in, or the oxygen').click();
	const [wound, oxygen] = [page.getByLabel('In words'), page.getByRole('textbox', { name: /^Oxygen/ })];
	await wound.fill('Half a senten');
	await oxygen.fill('2.5');
	await page.getByRole('button', { name: 'pacing wires' }).click();
	const out = page.getByRole('button', { name: 'Out: pacing wires' });
	await expect(out).toBeVisible();
	await out.click();
	await expect(page.getByText('Out earlier')).toBeVisible();
	await expect(wound).toHaveValue('Half a senten');
	await expect(oxygen).toHaveValue('2.5');

	await page.getByRole('button', { name: 'Note the oxygen' }).click();
	await expect(page.getByRole('listitem').filter({ hasText: 'oxygen 2.5 L/min' })).toBeVisible();
	await expect(wound).toHaveValue('Half a senten');
	await oxygen.fill('3');
	await page.getByRole('button', { name: 'Note it' }).click();
	await expect(page.getByRole('listitem').filter({ hasText: 'Half a senten' })).toBeVisible();
	await expect(oxygen).toHaveValue('3');
});

test('what is typed into a thread survives a reload, and what went out without an answer is not posted twice', async ({
	browser
}) => {
	const thread = await referred();
	const page = await pageOf(browser, 'nurse', { viewport: PHONE });
	await page.goto(thread);
	await expectConnected(page);
	await field(page).fill('Half a sentence');
	await page.reload();
	await expect(field(page)).toHaveValue('Half a sentence');

	await sendAndLoseTheAnswer(page);
	await expect(field(page)).toHaveValue('Half a sentence');
	await page.reload();
	await expect(field(page)).toHaveValue('Half a sentence');
	await page.getByRole('button', { name: 'Send' }).click();
	await expect(field(page)).toHaveValue('');
	await expect(page.getByText('Half a sentence')).toHaveCount(1);
});

test('what is changed in a thread after it went out without an answer is another entry', async ({
	browser
}) => {
	const page = await pageOf(browser, 'nurse', { viewport: PHONE });
	await page.goto(await referred());
	await expectConnected(page);
	await field(page).fill('Ate half.');
	await sendAndLoseTheAnswer(page);
	await field(page).fill('Ate nothing.');
	await page.getByRole('button', { name: 'Send' }).click();
	await expect(field(page)).toHaveValue('');
	await expect(page.getByText('Ate half.')).toHaveCount(1);
	await expect(page.getByText('Ate nothing.')).toHaveCount(1);
});

/** What is typed arrives, but the answer never comes back. */
async function sendAndLoseTheAnswer(page: Page): Promise<void> {
	const posting = `**${new URL(page.url()).pathname}?/post`;
	await page.route(posting, async (route) => {
		await route.fetch();
		await route.abort();
	});
	await field(page).press('Control+Enter');
	await expect(page.getByText('No answer: this may not have arrived')).toBeVisible();
	await page.unroute(posting);
}

test('a thread of several pages opens at its end and marks what arrives', async ({ browser }) => {
	test.setTimeout(120_000);
	const thread = await referred();
	const threadId = thread.split('/').at(-1) ?? '';
	const say = async (body: string) => (await as('nurse')).post(`/api/threads/${threadId}/entries`, { body });
	for (let n = 1; n <= 205; n += 1) {
		await say(`Line ${n}`);
	}
	const page = await pageOf(browser, 'therapist');
	await page.goto(thread);
	await expectConnected(page);
	await expect(page.getByText('Line 205', { exact: true })).toBeInViewport();
	await say('The newest of all.');
	const newest = page.getByRole('listitem').filter({ hasText: 'The newest of all.' });
	await expect(newest).toBeInViewport();
	await expect(newest.getByText('new', { exact: true })).toBeVisible();
	await page.evaluate(() => scrollTo(0, 0));
	await say('Newer still.');
	await expect(page.getByRole('link', { name: /New below/ })).toBeVisible();
});

test('nothing of a patient is shown under another patient’s nameboard', async ({ browser }) => {
	const other = await admit(await as('coordinator'));
	const thread = await referred();
	const page = await pageOf(browser, 'therapist');
	const wrong = await page.goto(thread.replace(episodeId, other));
	expect(wrong?.status()).toBe(404);
});

test('the pages of a patient have no fault that a machine can find, by day and by night', async ({
	browser
}) => {
	test.setTimeout(120_000);
	const { items } = (await (await as('therapist')).get('/api/episodes?limit=200')).body;
	const found: string[] = [];
	for (const [inBed, viewport] of [
		['T4', PHONE],
		['T8', DESK]
	] as const) {
		const id = String(items.find(({ bed }) => bed === inBed)?.id);
		const board = (await (await as('surgeon')).get(`/api/episodes/${id}`)).body;
		const within = (part: string, of: { id: string }[]) =>
			of.map((each) => `/patients/${id}/${part}/${each.id}`);
		const paths = [
			...['', '/refer', '/clearances', '/sessions'].map((part) => `/patients/${id}${part}`),
			...within('threads', board.threads ?? []),
			...within('clearances', board.clearances ?? [])
		];
		const page = await pageOf(browser, 'surgeon', { viewport });
		for (const path of paths) {
			await page.emulateMedia({ colorScheme: 'light' });
			await page.goto(path);
			const byDay = await faultsOf(page);
			await page.emulateMedia({ colorScheme: 'dark' });
			const byNight = await faultsOf(page, 'html', ['color-contrast']);
			found.push(...[...byDay, ...byNight].map((fault) => `${path} ${fault.join(' ')}`));
		}
	}
	expect(found).toEqual([]);
});
