import { expect } from '@playwright/test';
import { itemsOf } from '../../support/fakes';
import { SECRET, type Day } from './day';

interface Mail {
	to: string;
	subject: string;
	text: string;
}

/** The therapist closes the referral; who asked gets a link alone, and reads behind it how it went. */
export async function closeReferral(day: Day): Promise<void> {
	const page = await day.back('therapist', day.thread);
	await page.getByText('Close this referral').click();
	await page.getByLabel(/^Reason/).fill('Climbs a flight alone.');
	await page.getByRole('button', { name: 'Close', exact: true }).click();
	await expect(page.getByText('Closed: Climbs a flight alone.')).toBeVisible();

	const summaries = async () =>
		(await itemsOf<Mail>(`${day.product.mailUrl}/mails`)).filter(({ subject }) =>
			/a summary to read/.test(subject)
		);
	await expect.poll(async () => (await summaries()).length).toBe(1);
	const [mail] = await summaries();
	expect(mail?.to).toContain('surgeon@saltmarsh.example');
	expect(`${mail?.subject} ${mail?.text}`).not.toMatch(SECRET);
	expect(mail?.text).not.toContain('Climbs');
	const address = /https?:\S+/.exec(mail?.text ?? '')?.[0] ?? '';
	expect(address).toBe(day.product.url + day.thread);
	const surgeon = await day.back('surgeon', address);
	await expect(surgeon.getByText('Closed: Climbs a flight alone.')).toBeVisible();
}
