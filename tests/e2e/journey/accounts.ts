import { expect } from '@playwright/test';
import { mailArrives } from '../fakes';
import { DESK, expectConnected, seat } from '../people';
import type { Day } from './day';

const NEW = { name: 'Tamsin Orrel', email: 'tamsin@saltmarsh.example' };
const SENTENCE = 'harbour lights over nine boats';

/** The administrator invites a nurse; the link lies in the mailbox, works once, and leads to the ward. */
export async function invite(day: Day): Promise<void> {
	const page = day.page('admin');
	await page.goto('/admin/accounts');
	await expectConnected(page);
	const form = page.getByRole('region', { name: 'Invite somebody' });
	await form.getByLabel(/^Name/).fill(NEW.name);
	await form.getByLabel(/^E-mail/).fill(NEW.email);
	await form.getByLabel(/^Role/).selectOption({ label: 'nurse' });
	await form.getByLabel('Tern Ward').check();
	await form.getByRole('button', { name: 'Send the invitation' }).click();
	await expect(page.getByText(`A link is on its way to ${NEW.email}.`)).toBeVisible();
	await expect(page.getByRole('row').filter({ hasText: NEW.name })).toContainText('Invited');

	const mail = await mailArrives(day.product.mailUrl, NEW.email);
	const link = /https?:\S+\/invite\/\S+/.exec(mail.text)?.[0] ?? '';
	const guest = await seat(day.browser, day.product.url, null, DESK);
	await guest.page.goto(link);
	await expect(guest.page.getByText(NEW.email)).toBeVisible();
	await guest.page.getByLabel(/^New password/).fill(SENTENCE);
	await guest.page.getByRole('button', { name: 'Save and sign in' }).click();
	await expect(guest.page).toHaveURL(/\/loose-ends/);
	await expectConnected(guest.page);
	expect(guest.complaints).toEqual([]);
	await guest.page.goto(link);
	await expect(guest.page.getByRole('heading', { name: 'This link opens nothing' })).toBeVisible();
	await guest.context.close();
	await page.reload();
	await expect(page.getByRole('row').filter({ hasText: NEW.name })).toContainText('In use');
}
