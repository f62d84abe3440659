import { expect, test, type Page } from '@playwright/test';
import { admit, signInAs } from '../support/api';
import { itemsOf } from '../support/fakes';
import { startProduct, type Product } from '../support/server';
import { textArrives } from '../e2e/fakes';
import { expectConnected, PHONE, seat } from '../e2e/people';

/**
 * The pictures of the documents, each from the demonstration hospital as anybody gets it. Nothing is drawn or cut by
 * hand: what the product looks like is what its documents show.
 */
const DESK = { width: 1180, height: 760 };
const FOLDER = 'docs/pictures';

let product: Product;

test.describe.configure({ mode: 'serial' });
test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
});
test.afterAll(() => product?.stop());

async function taken(page: Page, name: string): Promise<void> {
	await page.evaluate(() => document.fonts.ready);
	await page.screenshot({ path: `${FOLDER}/${name}.png`, animations: 'disabled' });
}

/** The patient in a bed of the demonstration. */
async function openBed(page: Page, bed: string): Promise<void> {
	await page.goto('/ward');
	await page.getByRole('row').filter({ hasText: bed }).getByRole('link').first().click();
	await expect(page).toHaveURL(/\/patients\//);
}

test('therapist: a thread', async ({ browser }) => {
	const { page, context } = await seat(browser, product.url, 'therapist', DESK);
	await openBed(page, 'T4');
	await page.getByRole('main').getByRole('link', { name: 'Physiotherapy' }).first().click();
	await expect(page).toHaveURL(/threads/);
	await expectConnected(page);
	await taken(page, 'thread');
	await context.close();
});

for (const [who, name] of [
	['surgeon', 'surgeon'],
	['physician', 'physician'],
	['speech-therapist', 'speech-therapist']
] as const) {
	test(`${who}: loose ends`, async ({ browser }) => {
		const { page, context } = await seat(browser, product.url, who, DESK);
		await taken(page, name);
		await context.close();
	});
}

test('nurse: the ward on a phone', async ({ browser }) => {
	const { page, context } = await seat(browser, product.url, 'nurse', PHONE);
	await page.goto('/ward');
	await expectConnected(page);
	await taken(page, 'nurse');
	await context.close();
});

test('coordinator: a week of visits', async ({ browser }) => {
	const { page, context } = await seat(browser, product.url, 'coordinator', DESK);
	await page.goto('/visits');
	await expectConnected(page);
	await taken(page, 'coordinator');
	await context.close();
});

test('admin: accounts', async ({ browser }) => {
	const { page, context } = await seat(browser, product.url, 'admin', DESK);
	await page.goto('/admin/accounts');
	await expectConnected(page);
	await taken(page, 'admin');
	await context.close();
});

test('nurse: a call on the phone', async ({ browser }) => {
	const therapist = await signInAs(product.url, 'therapist');
	const { items } = (await therapist.get('/api/episodes')).body;
	const episode = items.find(({ bed }) => bed === 'T4') ?? items[0];
	await therapist.post(`/api/episodes/${episode?.id}/escalations`, {
		grade: 'high',
		situation: 'Pressure fell while walking.',
		background: 'Third day.',
		assessment: 'Sitting, still low.',
		request: 'Please come.'
	});
	const text = await textArrives(product.smsUrl, /Rona Ferris/, /HIGH/);
	const { page, context } = await seat(browser, product.url, null, PHONE);
	await page.goto(/https?:\S+\/t\/\S+/.exec(text.body)?.[0] ?? '');
	await expect(page.getByRole('button', { name: 'I take it' })).toBeVisible();
	await taken(page, 'call');
	await context.close();
});

test('patient: their own page', async ({ browser }) => {
	const desk = await signInAs(product.url, 'coordinator');
	const patient = {
		name: 'Ines Varela',
		birthDate: '1961-04-02',
		sex: 'female',
		mrn: 'SG-90417',
		email: 'ines@post.example',
		mailConsent: true
	};
	const episodeId = await admit(desk, { patient, bed: 'T41' });
	const inTwoDays = new Date(Date.now() + 2 * 86_400_000).toISOString().slice(0, 10);
	const series = {
		from: inTwoDays,
		weekdays: ['mon', 'wed', 'fri'],
		time: '10:00',
		count: 6,
		minutes: 45,
		place: 'East Gym'
	};
	await desk.post(`/api/episodes/${episodeId}/visits`, { series });
	await desk.post(`/api/episodes/${episodeId}/patient-page`, { way: 'mail' });
	const links = async () =>
		(await itemsOf<{ text: string }>(`${product.mailUrl}/mails`)).flatMap(
			({ text }) => /https?:\S+\/p\/[\w-]{22}/.exec(text) ?? []
		);
	await expect.poll(async () => (await links()).length).toBe(1);
	const { page, context } = await seat(browser, product.url, null, PHONE);
	await page.goto((await links())[0] ?? '');
	await expect(page.getByRole('heading', { name: 'Your visits' })).toBeVisible();
	await taken(page, 'patient');
	await context.close();
});
