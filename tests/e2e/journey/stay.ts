import { expect, type Page } from '@playwright/test';
import { itemsOf } from '../../support/fakes';
import { expectConnected } from '../people';
import { MAIL, SECRET, type Day } from './day';

/** Somebody, in the same shift as before, goes to a page. */
async function open(day: Day, who: 'coordinator' | 'surgeon', path: string): Promise<Page> {
	const page = day.page(who);
	await page.goto(path);
	await expectConnected(page);
	return page;
}

/** The coordinator puts the contact right: consent that was withdrawn, and was a slip. */
export async function correctContact(day: Day): Promise<void> {
	const page = await open(day, 'coordinator', `/patients/${day.episodeId}/details`);
	const consent = page.getByRole('checkbox', { name: /Agrees to mails/ });
	for (const agrees of [false, true]) {
		await consent.setChecked(agrees);
		await page.getByRole('button', { name: 'Keep the contact' }).click();
		await expect(page.getByText('On record.')).toBeVisible();
		await page.reload();
		await expect(consent).toBeChecked({ checked: agrees });
	}
	await expect(page.getByLabel(/^E-mail address/)).toHaveValue(MAIL);
}

/** To another bed: the ward of whoever looks on shows it at once. */
export async function moveBed(day: Day): Promise<void> {
	const nurse = await day.back('nurse', '/ward');
	const page = await open(day, 'coordinator', `/patients/${day.episodeId}/move`);
	await page.getByLabel(/^Unit/).selectOption({ label: 'Tern Ward' });
	await page.getByLabel(/^Bed/).fill('T22');
	await page.getByRole('button', { name: 'Move the patient' }).click();
	await expect(nurse.getByText('T22').first()).toBeVisible();
}

/** The stay ends: who referred gets a link alone, and the link to the patient's page opens nothing any more. */
export async function endStay(day: Day): Promise<void> {
	const mails = () => itemsOf<{ to: string; subject: string; text: string }>(`${day.product.mailUrl}/mails`);
	const links = async () =>
		(await mails()).flatMap(({ text }) => /https?:\S+\/p\/[\w-]{22}/.exec(text) ?? []);
	const before = await links();
	const page = await open(day, 'coordinator', day.visits);
	await page.getByRole('button', { name: 'Send a link by mail' }).click();
	await expect.poll(async () => (await links()).length).toBe(before.length + 1);
	const link = (await links()).find((one) => !before.includes(one)) ?? '';
	expect((await fetch(link)).status).toBe(200);

	// A referral that is still open: whoever asked is told that the stay is over.
	const surgeon = await open(day, 'surgeon', `/patients/${day.episodeId}/refer`);
	await surgeon.getByRole('radio', { name: 'Speech therapy' }).check();
	await surgeon.getByRole('radio', { name: 'Routine' }).check();
	await surgeon.getByLabel(/What you ask/).fill('Voice still weak?');
	await surgeon.getByRole('button', { name: /refer/i }).click();
	await expect(surgeon).toHaveURL(/threads/);
	const told = async () => (await mails()).filter(({ to }) => to.includes('surgeon@')).length;
	const toldBefore = await told();
	await page.goto(`/patients/${day.episodeId}/move`);
	await page.getByRole('radio', { name: 'To another hospital' }).check();
	await page.getByRole('button', { name: 'Close the episode' }).click();
	await expect.poll(told).toBe(toldBefore + 1);
	expect((await mails()).map(({ subject }) => subject).join(' ')).not.toMatch(SECRET);
	expect((await fetch(link)).status).toBe(410);
}
