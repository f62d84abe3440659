import { expect } from '@playwright/test';
import { addDays } from '../../../src/lib/domain/core/time';
import { itemsOf } from '../../support/fakes';
import { expectAccessible } from '../accessible';
import { PHONE } from '../people';
import { goTo, press, row, rowOf, shown, type Day } from './day';

/** The coordinator sends the private link; it lies in the patient's mailbox. */
async function sentLink(day: Day): Promise<string> {
	const page = await day.back('coordinator', day.visits);
	await page.getByRole('button', { name: 'Send a link by mail' }).click();
	await expect(page.getByText(/A link was sent by mail/)).toBeVisible();
	const links = async () =>
		(await itemsOf<{ text: string }>(`${day.product.mailUrl}/mails`)).flatMap(
			({ text }) => /https?:\S+\/p\/[\w-]{22}/.exec(text) ?? []
		);
	await expect.poll(async () => (await links()).length).toBe(1);
	return (await links())[0] ?? '';
}

/** The patient's own page, without script: a yes, a no with why, and a calendar file. */
export async function ownPage(day: Day): Promise<void> {
	const link = await sentLink(day);
	const coordinator = day.page('coordinator');
	// A preview looks, twice: nothing changes.
	for (const method of ['GET', 'HEAD']) {
		expect((await fetch(link, { method })).status).toBe(200);
	}
	const phone = await day.browser.newContext({ viewport: PHONE, javaScriptEnabled: false });
	const page = await phone.newPage();
	await page.goto(link);
	await expect(page.getByRole('heading', { name: 'Your visits' })).toBeVisible();
	expect(await page.content()).not.toMatch(/Penhale|Orla|T21|bypass|surgery/i);
	const monday = page.getByRole('listitem').first();
	await monday.getByRole('button', { name: /^I will come on Monday/ }).click();
	await expect(monday.getByText('You have said that you will come.')).toBeVisible();
	await expect(row(coordinator, shown('Mon', day.monday))).toContainText('confirmed');

	const thursday = page.getByRole('listitem').nth(1);
	await thursday.locator('summary', { hasText: 'I cannot come' }).click();
	await thursday.getByLabel(/Why not/).fill('No bus that day.');
	await thursday.getByRole('button', { name: /^Cancel the visit on Thursday/ }).click();
	await expect(thursday.getByText('You have cancelled it. Thank you for saying so.')).toBeVisible();
	await expect(row(coordinator, shown('Thu', addDays(day.monday, 3)))).toContainText(
		'They write: No bus that day.'
	);
	await phone.close();
	const file = await fetch(`${link}/visits.ics`);
	expect(file.headers.get('content-type')).toContain('text/calendar');
	const entries = (await file.text()).match(/STATUS:\w+/g) ?? [];
	expect(entries.toSorted()).toEqual(['STATUS:CANCELLED', ...Array<string>(4).fill('STATUS:CONFIRMED')]);

	await cleanByDayAndNight(day, link);
	await ended(day, link);
}

async function cleanByDayAndNight(day: Day, link: string): Promise<void> {
	for (const colorScheme of ['light', 'dark'] as const) {
		const context = await day.browser.newContext({ viewport: PHONE, colorScheme, reducedMotion: 'reduce' });
		const page = await context.newPage();
		await page.goto(link);
		await expect(page.getByRole('heading', { name: 'Your visits' })).toBeVisible();
		await expectAccessible(page);
		await context.close();
	}
}

/** A link that has ended says whom to call. */
async function ended(day: Day, link: string): Promise<void> {
	const coordinator = day.page('coordinator');
	await coordinator.getByRole('button', { name: 'End the link' }).click();
	await expect(coordinator.getByText(/^No link is open\./)).toBeVisible();
	const context = await day.browser.newContext({ viewport: PHONE });
	const page = await context.newPage();
	expect((await page.goto(link))?.status()).toBe(410);
	await expect(page.getByRole('heading', { name: 'This link has ended' })).toBeVisible();
	await expect(page.getByRole('link', { name: '+353 1 555 0100' })).toBeVisible();
	await expectAccessible(page);
	await context.close();
}

/** A no is a loose end of whoever plans visits, until somebody has followed it up. */
export async function followUp(day: Day): Promise<void> {
	const page = day.page('coordinator');
	await goTo(page, 'Loose ends');
	const end = rowOf(page).filter({ hasText: 'Visit cancelled by the patient: find another time' });
	await expect(end).toHaveCount(1);
	await press(end.getByRole('link', { name: /^Find a time/ }));
	await expect(page).toHaveURL(new RegExp(`${day.visits}$`));
	await page.getByRole('button', { name: /^Seen to/ }).click();
	await expect(page.getByText('Seen to.', { exact: true })).toBeVisible();
	await goTo(page, 'Loose ends');
	await expect(end).toHaveCount(0);
}
