import { expect, test } from '@playwright/test';
import { admit, signInAs, type Client } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { expectAccessible } from './accessible';
import { expectConnected, PHONE, seat } from './people';

let product: Product;
let nurse: Client;

test.beforeAll(async () => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	nurse = await signInAs(product.url, 'nurse');
});
test.afterAll(() => product?.stop());

interface Line {
	id: string;
	phase: string;
	precautions: { sternal: boolean };
}
async function patientIn(phase: string): Promise<string> {
	const { items } = (await nurse.get('/api/episodes?limit=200')).body as unknown as { items: Line[] };
	return items.find((line) => line.phase === phase && line.precautions.sternal)?.id ?? '';
}

test('the precautions stand on the patient’s page, and the wound is noted there', async ({ browser }) => {
	const { page, complaints } = await seat(browser, product.url, 'nurse', PHONE);
	const episodeId = await patientIn('inpatient');
	await page.goto(`/patients/${episodeId}`);
	// A press before script takes over is answered by the next page, which the browser complains of: slow-start's matter.
	await expectConnected(page);
	await expect(page.getByText('Pushing up through the arms.')).toBeVisible();
	await page.getByText('Note wound and breastbone').click();
	await page.getByRole('button', { name: 'Note it' }).click();
	await expect(page.getByText(/^Nothing is noted: say/)).toBeVisible();
	await page.getByRole('radio', { name: 'weeping' }).check();
	await page.getByRole('radio', { name: 'moves' }).check();
	await page.getByRole('button', { name: 'Note it' }).click();
	await expect(page.getByText('Tell the surgeon today')).toBeVisible();
	await expect(page.getByText('No arm work until the surgeon has seen it.')).toBeVisible();
	await expectAccessible(page);
	expect(complaints).toEqual([]);
	// Whoever treats reads it where the arms would be chosen.
	const { text } = await (await signInAs(product.url, 'therapist')).get(`/bedside/${episodeId}`);
	expect(text).toContain('The breastbone moves: no arm work until the surgeon has seen it.');
});

test('the surgeon comes from the loose end to the decision on the end of precautions', async ({
	browser
}) => {
	const { page } = await seat(browser, product.url, 'surgeon');
	const row = page.getByRole('listitem').filter({ hasText: 'End of the sternal precautions' });
	await row.getByRole('link', { name: /^Decide/ }).click();
	await page.getByRole('button', { name: 'Decide on their end' }).click();
	await expect(page).toHaveURL(/clearances\/[\w-]+$/);
	await expect(page.getByText(/weeks since the operation: may the precautions/).first()).toBeVisible();
});

test('a range is prescribed for an outpatient and stands at the bedside', async ({ browser }) => {
	const { page } = await seat(browser, product.url, 'physician');
	const id = await patientIn('outpatient');
	await page.goto(`/patients/${id}/limits`);
	await page.getByLabel('Pulse from').fill('120');
	await page.getByLabel('Pulse to').fill('110');
	await page.getByLabel('How it was found').selectOption('walk-test');
	await page.getByRole('button', { name: 'Prescribe' }).click();
	await expect(page.getByText(/Pulse from is 120 and Pulse to is 110/)).toBeVisible();
	await page.getByLabel('Pulse from').fill('90');
	await page.getByRole('button', { name: 'Prescribe' }).click();
	await expect(page.getByText('Pulse 90 to 110; six-minute walk')).toBeVisible();
	await page.goto(`/bedside/${id}`);
	await expect(page.getByText(/Range: pulse 90 to 110; six-minute walk/)).toBeVisible();
});

test('a calculator answers while one types, and the stairs are counted step by step', async ({ browser }) => {
	const { page, complaints } = await seat(browser, product.url, 'therapist', PHONE);
	await page.goto('/rules/calculators');
	await page.locator('#corridor-laps').fill('4');
	await page.locator('#corridor-minutes').fill('6');
	await expect(page.getByText('400 m', { exact: true })).toBeVisible();
	await page.locator('#pressures-hr').fill('251');
	await expect(page.getByText('hr is 251: it must be a number from 20 to 250 beats/min.')).toBeVisible();
	await expectAccessible(page);
	await page.goto(`/bedside/${await patientIn('inpatient')}`);
	await page.getByRole('radio', { name: '6', exact: true }).check();
	await page.getByRole('button', { name: /One flight of stairs/ }).click();
	await page.getByRole('button', { name: 'Step 1: pulse, breathing, face' }).click();
	await expect(page.getByRole('button', { name: 'Step 2: pulse, breathing, face' })).toBeVisible();
	await page.getByRole('radio', { name: 'awake, does not follow' }).check();
	await expect(page.getByText(/the passive set only, with arm and wrist supported/)).toBeVisible();
	await expect(page.getByRole('button', { name: 'Arms moved for the patient' })).toBeVisible();
	await expect(page.getByRole('button', { name: 'Ankle pumps' })).toHaveCount(0);
	expect(complaints).toEqual([]);
});

test('what was done without a clearance is recorded from the page, with why and on whose word', async ({
	browser
}) => {
	const episodeId = await admit(await signInAs(product.url, 'coordinator'), { level: 6 });
	const { page, complaints } = await seat(browser, product.url, 'therapist', PHONE);
	await page.goto(`/bedside/${episodeId}`);
	await page.getByRole('radio', { name: 'awake, follows commands' }).check();
	await page
		.getByRole('group', { name: /^Rate-slowing drug/ })
		.getByRole('radio', { name: 'no', exact: true })
		.check();
	await page.getByRole('radio', { name: 'sinus' }).check();
	const reading = (name: string) => page.getByRole('textbox', { name: new RegExp(`^${name}`) });
	for (const tab of [/Before/, /After/]) {
		await page.getByRole('tab', { name: tab }).click();
		await reading('Systolic').fill('124');
		await reading('Diastolic').fill('70');
		await reading('Pulse').fill('78');
	}
	await page.getByRole('button', { name: /One flight of stairs/ }).click();
	await expect(page.getByText('Not cleared: Stairs').first()).toBeVisible();
	await page.getByRole('button', { name: 'Record the session' }).click();
	await expect(page.getByText(/^Not recorded yet: a clearance is missing/)).toBeVisible();
	await page.getByLabel('Why it was done').fill('She was half way up already.');
	await page.getByLabel('On whose word, if anybody’s').fill('the surgeon');
	await page.getByLabel('I read the words back to them').check();
	await page.getByRole('button', { name: 'Record the session' }).click();
	await expect(page.getByText('Recorded: stop')).toBeVisible();
	// The refusal itself is an answer that the browser notes.
	expect(complaints.filter((each) => !each.includes('status of 409'))).toEqual([]);

	const surgeon = await seat(browser, product.url, 'surgeon', PHONE);
	const end = surgeon.page.getByRole('listitem').filter({ hasText: 'She was half way up already.' });
	await expect(end).toHaveCount(1);
	await end.getByRole('button', { name: /^Seen/ }).press('Enter');
	await expect(end).toHaveCount(0);
});

test('rules and sources say on a phone where each limit comes from, and are printed whole', async ({
	browser
}) => {
	const { page, complaints } = await seat(browser, product.url, 'nurse', PHONE);
	await page.goto('/rules');
	const source = page.getByText('AARC exercise oximetry protocol · published').filter({ visible: true });
	const howTo = page.getByText(/^Shuffle to the edge/).filter({ visible: true });
	await expect(source.first()).toBeVisible();
	await expect(howTo).toHaveCount(0);
	await expectAccessible(page);

	// A sheet of paper is 794 px wide; nothing folds there, nothing is cut off, and nothing is to be pressed.
	await page.setViewportSize({ width: 794, height: 1123 });
	await page.emulateMedia({ media: 'print' });
	await expect(source.first()).toBeVisible();
	await expect(howTo.first()).toBeVisible();
	await expect(page.getByRole('navigation')).toHaveCount(0);
	await expect(page.getByRole('button', { name: 'Print' })).toHaveCount(0);
	expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(794);
	expect(complaints).toEqual([]);
});
