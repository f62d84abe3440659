import { expect, test } from '@playwright/test';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { expectConnected, holdScripts, PHONE, seat } from './people';

let product: Product;
let episodeId: string;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	episodeId = await admit(await signInAs(product.url, 'coordinator'), { level: 5 });
});
test.afterAll(() => product?.stop());

test('what is entered before script takes over stays, in every kind of control, and is what is sent', async ({
	browser
}) => {
	const { page, context, complaints } = await seat(browser, product.url, 'coordinator');
	const release = await holdScripts(page);
	await page.goto('/ward/admit', { waitUntil: 'commit' });
	const patient = page.getByLabel(/^Name/);
	await patient.fill('Łódź Őry');
	await page.getByLabel(/^Hospital number/).fill('SG-88001');
	await page.getByLabel(/^Birth date/).fill('1948-05-06');
	await page.getByLabel(/^Sex/).selectOption('male');
	await page.getByRole('checkbox', { name: /Consents/ }).check();
	await page.getByLabel(/^Telephone/).fill('+353865550199');
	await page.getByLabel(/^Unit/).selectOption({ label: 'Tern Ward' });
	await page.getByLabel(/^Bed/).fill('T77');
	await page
		.getByRole('group', { name: /^Level/ })
		.getByRole('radio', { name: '5' })
		.check();
	await page
		.getByRole('group', { name: /^Rate-slowing/ })
		.getByRole('radio', { name: 'Yes' })
		.check();
	await page.getByLabel(/^Rhythm/).selectOption('paced');
	await patient.focus();
	expect(await page.getByText('Connected', { exact: true }).count()).toBe(0);

	release();
	await expectConnected(page);
	await expect(patient).toBeFocused();
	await expect(patient).toHaveValue('Łódź Őry');
	await expect(page.getByLabel(/^Sex/)).toHaveValue('male');
	await expect(page.getByRole('checkbox', { name: /Consents/ })).toBeChecked();
	await expect(page.getByRole('group', { name: /^Level/ }).getByRole('radio', { name: '5' })).toBeChecked();
	await page.getByRole('button', { name: 'Admit' }).click();
	await expect(page).toHaveURL(/\/patients\//);

	const id = new URL(page.url()).pathname.split('/')[2] ?? '';
	const { body } = await (await signInAs(product.url, 'coordinator')).get(`/api/episodes/${id}`);
	expect(body).toMatchObject({
		patient: { name: 'Łódź Őry', mrn: 'SG-88001', birthDate: '1948-05-06', sex: 'male' },
		bed: 'T77',
		level: 5,
		betaBlocked: true,
		rhythm: 'paced'
	});
	expect(complaints).toEqual([]);
	await context.close();
});

test('a choice made before script takes over can be changed after it', async ({ browser }) => {
	const { page, context } = await seat(browser, product.url, 'surgeon');
	const release = await holdScripts(page);
	await page.goto(`/patients/${episodeId}/refer`, { waitUntil: 'commit' });
	await page.getByRole('radio', { name: 'Speech therapy' }).check();
	await page.getByRole('radio', { name: 'Soon' }).check();
	await page.getByLabel(/What you ask/).fill('Voice is weak.');
	release();
	await expectConnected(page);
	await expect(page.getByRole('radio', { name: 'Speech therapy' })).toBeChecked();
	await expect(page.getByRole('radio', { name: 'Soon' })).toBeChecked();
	await page.getByRole('radio', { name: 'Urgent' }).check();
	await page.getByRole('button', { name: 'Refer' }).click();
	await expect(page).toHaveURL(/threads/);
	const { body } = await (
		await signInAs(product.url, 'surgeon')
	).get(`/api/threads/${page.url().split('/').at(-1)}`);
	expect(body.referral).toMatchObject({
		service: 'speech-therapy',
		priority: 'urgent',
		question: 'Voice is weak.'
	});
	await context.close();
});

test('a line begun before script takes over stands below the draft that was kept', async ({ browser }) => {
	const surgeon = await signInAs(product.url, 'surgeon');
	const referral = { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' };
	const { body } = await surgeon.post(`/api/episodes/${episodeId}/referrals`, referral);
	const { page, context } = await seat(browser, product.url, 'nurse', PHONE);
	const field = page.getByLabel('Write into the thread');
	await page.goto(`/patients/${episodeId}/threads/${body.threadId}`);
	await expectConnected(page);
	await field.fill('Slept well.');
	const release = await holdScripts(page);
	await page.reload({ waitUntil: 'commit' });
	await field.fill('Ate little.');
	release();
	await expectConnected(page);
	await expect(field).toHaveValue('Slept well.\nAte little.');
	await context.close();
});

test('a fold opened before script takes over stays open, and what its form answers is seen', async ({
	browser
}) => {
	const { page, context } = await seat(browser, product.url, 'nurse', PHONE);
	const release = await holdScripts(page);
	await page.goto(`/patients/${episodeId}`, { waitUntil: 'commit' });
	const noteIt = page.getByRole('button', { name: 'Note it' });
	await page.getByText('Note wound and breastbone').click();
	await expect(noteIt).toBeVisible();
	release();
	await expectConnected(page);
	await expect(noteIt).toBeVisible();

	const again = await holdScripts(page);
	await page.reload({ waitUntil: 'commit' });
	await page.getByText('Note wound and breastbone').click();
	await noteIt.click();
	await expect(page).toHaveURL(/wound/);
	again();
	await expectConnected(page);
	await expect(page.getByText(/^Nothing is noted: say/)).toBeVisible();
	await context.close();
});

test('a press before script takes over sends nothing of a form that only script can send, and keeps what was typed', async ({
	browser
}) => {
	const { page, context } = await seat(browser, product.url, 'coordinator');
	const release = await holdScripts(page);
	await page.goto('/visits/closed-days', { waitUntil: 'commit' });
	const [day, name] = [page.getByLabel(/^Day/), page.getByLabel(/^Name of the day/)];
	const close = page.getByRole('button', { name: 'Close this day' });
	await day.fill('6 1 2028');
	await name.fill('Harbour Day');
	await close.click();
	release();
	await expectConnected(page);
	await expect(page).toHaveURL(/closed-days$/);
	await expect(day).toHaveValue('6 1 2028');
	await expect(name).toHaveValue('Harbour Day');
	await close.click();
	await expect(page.getByText('The day is closed.')).toBeVisible();
	await context.close();
});

test('without script such a form says that it needs it', async ({ browser }) => {
	const context = await browser.newContext({ baseURL: product.url, javaScriptEnabled: false });
	const [cookie = '', value = ''] = ((await signInAs(product.url, 'coordinator')).cookie ?? '').split('=');
	await context.addCookies([{ name: cookie, value, url: product.url }]);
	const page = await context.newPage();
	await page.goto('/visits/closed-days');
	await expect(page.getByText('This form needs script in this browser.')).toBeVisible();
	await expect(page.getByLabel(/^Name of the day/)).toBeHidden();
	await context.close();
});
