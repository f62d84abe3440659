import { expect, test, type Page } from '@playwright/test';
import { PASSWORD, SIGN_INS } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { textArrives } from './fakes';
import { Scriptless } from './scriptless-people';

/** The forms that must not wait for script: signing in, a referral, an entry, a decision, a call, a patient's reply. */
let product: Product;
let people: Scriptless;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	people = new Scriptless(product);
});
test.afterAll(() => product?.stop());

const alerts = (page: Page) => page.getByRole('alert').filter({ hasText: /./ });
const press = (page: Page, name: string | RegExp) => page.getByRole('button', { name }).click();

test('sign in: a wrong password keeps the address, and the right one leads where one was going, and out again', async ({
	browser
}) => {
	const page = await people.phoneOf(browser, null);
	await page.goto('/ward');
	const [address, password] = [page.getByLabel('E-mail address'), page.getByLabel(/^Password/)];
	await address.fill(SIGN_INS.nurse);
	await press(page, 'Sign in');
	await expect(page.getByText('Password is empty.')).toBeVisible();
	await expect(password).toHaveAttribute('aria-invalid', 'true');
	await password.fill('not the password');
	await press(page, 'Sign in');
	await expect(alerts(page)).toContainText('The e-mail address or the password is wrong.');
	await expect(address).toHaveValue(SIGN_INS.nurse);
	await expect(password).toHaveValue('');
	await password.fill(PASSWORD);
	await press(page, 'Sign in');
	await expect(page).toHaveURL(/\/ward$/);
	expect(await (await page.request.get('/api/me')).json()).toMatchObject({ user: { email: SIGN_INS.nurse } });

	await press(page, 'More');
	await press(page, 'Sign out');
	await page.goto('/ward');
	await expect(page).toHaveURL(/\/sign-in/);
	expect((await page.request.get('/api/me')).status()).toBe(401);
});

test('refer: what is missing is named, what was chosen stays, and the thread begins', async ({ browser }) => {
	const { episodeId } = await people.referred();
	const page = await people.phoneOf(browser, 'surgeon');
	await page.goto(`/patients/${episodeId}/refer`);
	await page.getByRole('radio', { name: 'Speech therapy' }).check();
	await page.getByRole('radio', { name: 'Urgent' }).check();
	await press(page, 'Refer');
	await expect(alerts(page)).toHaveText('What you ask is empty.');
	await expect(page.getByRole('radio', { name: 'Speech therapy' })).toBeChecked();
	await expect(page.getByRole('radio', { name: 'Urgent' })).toBeChecked();
	await page.getByLabel(/What you ask/).fill('Voice is weak.');
	await press(page, 'Refer');
	await expect(page).toHaveURL(/\/threads\//);
	await expect(page.getByText('Voice is weak.')).toBeVisible();
	const { body } = await (await people.as('surgeon')).get(`/api/threads/${page.url().split('/').at(-1)}`);
	expect(body.referral).toMatchObject({
		service: 'speech-therapy',
		priority: 'urgent',
		question: 'Voice is weak.'
	});
});

test('a loose end leads to its thread, and is closed there', async ({ browser }) => {
	const { threadId } = await people.referred();
	const page = await people.phoneOf(browser, 'therapist');
	await page.goto('/loose-ends');
	await page.locator(`a[data-row-step][href*="${threadId}"]`).click();
	await press(page, /^Accept$/);
	await expect(page.getByText('Accepted.', { exact: true })).toBeVisible();
	const { body } = await (await people.as('therapist')).get(`/api/threads/${threadId}`);
	expect(body.referral).toMatchObject({ state: 'accepted' });
	await page.goto('/loose-ends');
	await expect(page.getByRole('heading', { name: 'Waiting on you' })).toBeVisible();
	await expect(page.locator(`main a[href*="${threadId}"]`)).toHaveCount(0);
});

test('write into a thread: an entry is there once, and one that comes too late is kept', async ({
	browser
}) => {
	const { thread, threadId, referralId } = await people.referred();
	const surgeon = await people.as('surgeon');
	const entries = async () => (await surgeon.get(`/api/threads/${threadId}`)).body.items;
	const page = await people.phoneOf(browser, 'nurse');
	const field = page.getByLabel('Write into the thread');
	await page.goto(thread);
	await press(page, 'Send');
	await expect(page.getByText('Entry is empty.')).toBeVisible();
	await expect(field).toHaveAttribute('aria-invalid', 'true');
	await field.fill('Slept well.');
	await page.getByLabel('A question to').selectOption({ label: 'Hilde Castellane, surgeon' });
	await press(page, 'Send');
	await expect(page.getByText('Slept well.')).toBeVisible();
	await expect(field).toHaveValue('');
	await page.reload();
	expect((await entries()).filter(({ body }) => body === 'Slept well.')).toHaveLength(1);
	const asked = (await surgeon.get('/api/loose-ends')).body.mine as unknown as { threadId: string }[];
	expect(asked.map((end) => end.threadId)).toContain(threadId);

	await surgeon.post(`/api/referrals/${referralId}/withdraw`, { reason: 'In error.' });
	await field.fill('Ate little.');
	await press(page, 'Send');
	await expect(alerts(page)).toContainText('The referral was withdrawn; its thread takes no more entries.');
	await expect(page.getByText('Ate little.')).toBeVisible();
	expect((await entries()).some(({ body }) => body === 'Ate little.')).toBe(false);
});

test('decide yes: a day that is past is named beside its field, all else stays, and the limit holds', async ({
	browser
}) => {
	const { episodeId } = await people.referred();
	const arms = await people.asked(episodeId, 'arm-stage');
	const page = await people.phoneOf(browser, 'surgeon');
	await page.goto(arms.page);
	await press(page, /^Clear/);
	await expect(page.getByText('Choose how far, or that there is no limit.')).toBeVisible();
	await page.getByRole('radio', { name: '90°' }).check();
	await page.getByText('Review date, another limit, note').click();
	await page.getByLabel('Review on').fill('1 12 2020');
	await page.getByLabel('Note').fill('Look at the wound first.');
	await press(page, /^Clear/);
	await expect(page.getByText('Review date: today or later.')).toBeVisible();
	await expect(page.getByLabel('Review on')).toHaveAttribute('aria-invalid', 'true');
	await expect(page.getByRole('radio', { name: '90°' })).toBeChecked();
	await expect(page.getByLabel('Note')).toHaveValue('Look at the wound first.');
	await page.getByLabel('Review on').fill('');
	await press(page, /^Clear/);
	await expect(page.getByText('Cleared with limits')).toBeVisible();
	expect((await (await people.as('therapist')).get(arms.path)).body).toMatchObject({
		state: 'given-with-limits',
		limits: { maxElevationDeg: 90 },
		note: 'Look at the wound first.'
	});
});

test('decide no: a reason is needed, and whoever was slower is told who was faster', async ({ browser }) => {
	const { episodeId } = await people.referred();
	const stairs = await people.asked(episodeId, 'stairs');
	const slower = await people.phoneOf(browser, 'physician');
	await slower.goto(stairs.page);
	const page = await people.phoneOf(browser, 'surgeon');
	await page.goto(stairs.page);
	await page.getByRole('link', { name: 'Not cleared' }).click();
	const reason = page.getByLabel(/^Reason/);
	await expect(reason).toBeVisible();
	await press(page, 'Not cleared');
	await expect(page.getByText('Reason is empty.')).toBeVisible();
	await reason.fill('The wound weeps.');
	await press(page, 'Not cleared');
	await expect(page.getByText('The wound weeps.').first()).toBeVisible();
	expect((await (await people.as('therapist')).get(stairs.path)).body).toMatchObject({ state: 'withheld' });

	await slower.getByRole('radio', { name: 'one helper' }).check();
	await press(slower, /^Clear/);
	await expect(alerts(slower)).toContainText('Hilde Castellane was faster');
	expect((await (await people.as('therapist')).get(stairs.path)).body).toMatchObject({ state: 'withheld' });
});

const callOf = async (id: string) =>
	(await (await people.as('therapist')).get(`/api/escalations/${id}`)).body;

test('take a call, signed in: with the minutes, once, and whoever was slower reads who has it', async ({
	browser
}) => {
	const id = await people.called('W1');
	const slower = await people.phoneOf(browser, 'physician');
	await slower.goto(`/escalations/${id}`);
	const page = await people.phoneOf(browser, 'nurse');
	await page.goto(`/escalations/${id}`);
	await page.getByRole('radio', { name: '5', exact: true }).check();
	await press(page, 'I take it');
	await expect(page.getByText(/^You have it/)).toBeVisible();
	expect(await callOf(id)).toMatchObject({ state: 'taken', holder: { name: 'Rona Ferris' }, etaMinutes: 5 });
	await page.reload();
	await expect(page.getByText(/^You have it/)).toBeVisible();

	await press(slower, 'I take it');
	await expect(slower.getByText(/^Rona Ferris has it/)).toBeVisible();
	await expect(alerts(slower)).toContainText('Rona Ferris was faster: you have not taken it.');
	expect(await callOf(id)).toMatchObject({ holder: { name: 'Rona Ferris' } });
});

test('take a call by its link: taken, then on the way, then there, and none of it by looking', async ({
	browser
}) => {
	const id = await people.called('W2');
	const { body } = await textArrives(product.smsUrl, /Rona Ferris/, /bed W2\b/);
	const link = /\/t\/[\w-]+/.exec(body)?.[0] ?? '';
	const page = await people.phoneOf(browser, null);
	await page.goto(link);
	await expect(page.getByText('nobody has it yet')).toBeVisible();
	expect(await callOf(id)).toMatchObject({ state: 'raised' });
	await press(page, 'I take it');
	await expect(page.getByText(/^You have it/)).toBeVisible();
	await press(page, '10');
	await expect(page.getByText(/^There by/)).toBeVisible();
	expect(await callOf(id)).toMatchObject({
		state: 'taken',
		holder: { name: 'Rona Ferris' },
		etaMinutes: 10
	});
	await press(page, 'I am at the bedside');
	await expect(page.getByText(/^At the bedside since/)).toBeVisible();
	expect((await callOf(id)).arrivedAt).not.toBeNull();
});

test('a link whose call another has taken says so, and takes nothing', async ({ browser }) => {
	const id = await people.called('W3');
	const { body } = await textArrives(product.smsUrl, /Rona Ferris/, /bed W3\b/);
	const page = await people.phoneOf(browser, null);
	await page.goto(/\/t\/[\w-]+/.exec(body)?.[0] ?? '');
	await (await people.as('physician')).post(`/api/escalations/${id}/take`);
	await press(page, 'I take it');
	await expect(alerts(page)).toContainText('Not taken by you');
	await expect(page.getByText(/^Marta Lisowska has it/)).toBeVisible();
	expect(await callOf(id)).toMatchObject({ holder: { name: 'Marta Lisowska' } });
});

test('the patient says yes, and no with why; too many words are counted, and stay', async ({ browser }) => {
	const { link, states } = await people.ownPage();
	const page = await people.phoneOf(browser, null);
	await page.goto(link);
	const [first, second] = [page.getByRole('listitem').first(), page.getByRole('listitem').nth(1)];
	await first.getByRole('button', { name: /^I will come/ }).click();
	await expect(first.getByText('You have said that you will come.')).toBeVisible();
	expect((await states()).toSorted()).toEqual(['confirmed', 'planned']);

	await second.locator('summary').click();
	const why = second.getByLabel(/Why not/);
	// Not every browser counts by itself.
	await why.evaluate((field) => field.removeAttribute('maxlength'));
	await why.fill('x'.repeat(201));
	await second.getByRole('button', { name: /^Cancel the visit/ }).click();
	await expect(page.getByText('Why not: 201 characters were sent, and the limit is 200.')).toBeVisible();
	await expect(why).toHaveValue('x'.repeat(201));
	expect((await states()).toSorted()).toEqual(['confirmed', 'planned']);
	await why.fill('No bus that day.');
	await second.getByRole('button', { name: /^Cancel the visit/ }).click();
	await expect(second.getByText('You have cancelled it. Thank you for saying so.')).toBeVisible();
	expect((await states()).toSorted()).toEqual(['cancelled', 'confirmed']);
});
