import { expect, test, type Page } from '@playwright/test';
import { admit, signInAs, type Client } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { expectConnected, PHONE, seat } from './people';

let product: Product;
let coordinator: Client;
let surgeon: Client;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	[coordinator, surgeon] = await Promise.all([
		signInAs(product.url, 'coordinator'),
		signInAs(product.url, 'surgeon')
	]);
});
test.afterAll(() => product?.stop());

/** A patient of the test's own in this bed, referred to physiotherapy. */
async function referred(bed: string): Promise<{ episodeId: string; thread: string }> {
	const episodeId = await admit(coordinator, { bed, level: 5, betaBlocked: false, rhythm: 'sinus' });
	const referral = { service: 'physiotherapy', priority: 'urgent', question: 'Please begin.' };
	const { body } = await surgeon.post(`/api/episodes/${episodeId}/referrals`, referral);
	return { episodeId, thread: `/patients/${episodeId}/threads/${body.threadId}` };
}

/** A reading whose pressure falls by twenty: a stop. */
async function typeStop(page: Page): Promise<void> {
	const reading = (name: string) => page.getByRole('textbox', { name: new RegExp(`^${name}`) });
	await page.getByRole('radio', { name: 'awake, follows commands' }).check();
	await page
		.getByRole('group', { name: /^Rate-slowing drug/ })
		.getByRole('radio', { name: 'no', exact: true })
		.check();
	await page.getByRole('radio', { name: 'sinus' }).check();
	await reading('Systolic').fill('128');
	await reading('Diastolic').fill('74');
	await reading('Pulse').fill('76');
	await page.getByRole('tab', { name: /After/ }).click();
	await reading('Systolic').fill('108');
	await reading('Diastolic').fill('66');
	await reading('Pulse').fill('80');
}

test('without a network the page says so at once, stays, keeps what is typed, and sends it once afterwards', async ({
	browser
}) => {
	const { thread } = await referred('T91');
	const { page, context, complaints } = await seat(browser, product.url, 'nurse', PHONE);
	await page.goto(thread);
	await expectConnected(page);
	const field = page.getByLabel('Write into the thread');
	await field.fill('Pressure is steady.');

	await context.setOffline(true);
	await expect(page.getByText(/Not connected since \d\d:\d\d/)).toBeVisible({ timeout: 2_000 });
	await page.getByRole('button', { name: 'Send' }).click();
	await expect(page.getByText('Not sent: this device has no network')).toBeVisible();
	await expect(field).toHaveValue('Pressure is steady.');
	await page.getByRole('link', { name: 'Visits' }).last().click();
	await expect(page.getByText('This device has no network, so that page cannot be fetched')).toBeInViewport();
	await expect(page).toHaveURL(new RegExp(thread));
	await expect(field).toHaveValue('Pressure is steady.');

	await context.setOffline(false);
	await expectConnected(page);
	await page.getByRole('button', { name: 'Send' }).click();
	await expect(field).toHaveValue('');
	await expect(page.getByText('Pressure is steady.')).toHaveCount(1);
	await page.getByRole('link', { name: 'Open the page that you wanted' }).click();
	await expect(page).toHaveURL(/\/visits/);
	expect(complaints).toEqual([]);
	await context.close();
});

test('a session whose answer was lost is asked for at the next start, and then no longer reads as not sent', async ({
	browser
}) => {
	const { episodeId } = await referred('T92');
	const { page, context } = await seat(browser, product.url, 'therapist', PHONE);
	await page.goto(`/bedside/${episodeId}`);
	await typeStop(page);
	const sessions = `**/api/episodes/${episodeId}/sessions`;
	await page.route(sessions, async (route) => {
		await route.fetch();
		await route.abort();
	});
	await page.getByRole('button', { name: 'Record the session' }).click();
	await expect(page.getByText('Not sent yet, as far as we know')).toBeVisible();
	await page.unroute(sessions);
	await page.reload();
	await expect(page.getByRole('heading', { name: /Recorded/ })).toBeVisible();
	await expect(page.getByText('Not sent yet')).toHaveCount(0);
	await page.reload();
	await expect(page.getByRole('button', { name: 'Record the session' })).toBeVisible();
	await expect(page.getByText('What you had typed is back.')).toHaveCount(0);
	await context.close();
});

test('an open page follows the clock of the server', async ({ browser }) => {
	await referred('T93');
	const { page, context } = await seat(browser, product.url, 'therapist');
	const row = page.getByRole('listitem').filter({ hasText: 'T93' });
	await expect(row).not.toContainText('3 h');
	await product.advance(3 * 3_600_000);
	await expect(row).toContainText('3 h', { timeout: 30_000 });
	await context.close();
});

test('on a phone the bedside is a part of the ward, and its stop bar covers no field one is led to', async ({
	browser
}) => {
	const { episodeId } = await referred('T94');
	const { page, context } = await seat(browser, product.url, 'therapist', PHONE);
	await page.goto(`/bedside/${episodeId}`);
	await expect(page.locator('[aria-current="page"]:visible')).toHaveText('Ward');
	await typeStop(page);
	const bar = page.getByRole('alert').filter({ hasText: 'Measure again' });
	await expect(bar).toBeVisible();
	for (const field of await page.getByRole('textbox').all()) {
		await field.focus();
		const [low, top] = await Promise.all([field.boundingBox(), bar.boundingBox()]);
		expect((low?.y ?? 0) + (low?.height ?? 0)).toBeLessThanOrEqual((top?.y ?? 0) + 1);
	}
	await context.close();
});

test('names of patients stand in one face, whatever letters of Europe they need', async ({ browser }) => {
	const { page, context } = await seat(browser, product.url, null);
	await page.goto('/sign-in');
	const weights = [400, 700, 900];
	await page.evaluate(async (all) => {
		const names = 'Łódź ő č ř ş ž ě ů ű ą ę ć ń ś ż ğ ı ș ț ß Ø å é ñ';
		for (const weight of all) {
			const line = document.createElement('p');
			line.id = `names-${weight}`;
			line.style.fontWeight = `${weight}`;
			line.textContent = names;
			document.body.append(line);
			await document.fonts.load(`${weight} 16px "Ropewalk Sans"`, names);
		}
	}, weights);
	const devtools = await context.newCDPSession(page);
	await devtools.send('DOM.enable');
	await devtools.send('CSS.enable');
	const { root } = await devtools.send('DOM.getDocument');
	for (const weight of weights) {
		const line = { nodeId: root.nodeId, selector: `#names-${weight}` };
		const { nodeId } = await devtools.send('DOM.querySelector', line);
		const facesOf = async () => (await devtools.send('CSS.getPlatformFontsForNode', { nodeId })).fonts;
		// Only what has been drawn has a face.
		await expect.poll(async () => (await facesOf()).length).toBeGreaterThan(0);
		const fonts = await facesOf();
		expect(
			fonts.filter(({ familyName, isCustomFont }) => !isCustomFont || !familyName.startsWith('Ropewalk Sans'))
		).toEqual([]);
	}
	await context.close();
});

test('on a phone what is missing on a sheet is seen, and not under the buttons at its foot', async ({
	browser
}) => {
	const { episodeId } = await referred('T95');
	const therapist = await signInAs(product.url, 'therapist');
	const { body: call } = await therapist.post(`/api/episodes/${episodeId}/escalations`, {
		grade: 'high',
		situation: 'Systolic pressure fell from 128 to 108.',
		background: 'Bypass.',
		assessment: 'Too much.',
		request: 'Please come.'
	});
	const nurse = await signInAs(product.url, 'nurse');
	await nurse.post(`/api/escalations/${call.id}/take`);
	const { page, context } = await seat(browser, product.url, 'nurse', PHONE);
	await page.goto(`/escalations/${call.id}`);
	await expectConnected(page);
	await page.getByRole('button', { name: 'Settle' }).first().click();
	const sheet = page.getByRole('dialog');
	await sheet.getByRole('radio', { name: 'Settled with rest' }).check();
	await sheet.getByLabel(/^Note/).fill('122/70 after five minutes.');
	await sheet.getByRole('button', { name: 'Settle' }).click();
	const wrong = sheet.getByText(/^Measure again in: choose a time/);
	await expect(wrong).toBeVisible();
	const onTop = () =>
		wrong.evaluate((each) => {
			const { left, top, height } = each.getBoundingClientRect();
			return each.contains(document.elementFromPoint(left + 4, top + height / 2));
		});
	await expect.poll(onTop).toBe(true);
	await context.close();
});
