import { expect, type Page } from '@playwright/test';
import { textArrives } from '../fakes';
import { PHONE, seat } from '../people';
import { goTo, PATIENT, press, rowOf, SECRET, type Day } from './day';

/** A field of the reading that is open; the other moments' fields are there but hidden. */
const reading = (page: Page, name: string) => page.getByRole('textbox', { name: new RegExp(`^${name}`) });

/** The findings show while the therapist types. */
export async function notice(day: Day): Promise<void> {
	const page = day.page('therapist');
	await page.getByRole('link', { name: 'Record a session' }).click();
	await page.getByRole('radio', { name: 'awake, follows commands' }).check();
	await page
		.getByRole('group', { name: /^Rate-slowing drug/ })
		.getByRole('radio', { name: 'yes', exact: true })
		.check();
	await page.getByRole('radio', { name: 'sinus' }).check();
	await reading(page, 'Systolic').fill('128');
	await reading(page, 'Diastolic').fill('74');
	await reading(page, 'Pulse').fill('76');
	await page.getByRole('tab', { name: /After/ }).click();
	await reading(page, 'Systolic').fill('108');
	await expect(page.getByText('Stop. Sit the patient down.').first()).toBeVisible();
	await expect(page.getByText(/fell by 20|fall of 20|by 20 mmHg/i).first()).toBeVisible();
	await reading(page, 'Diastolic').fill('66');
	await reading(page, 'Pulse').fill('89');
	// By how much, and past which limit: that of a patient with a rate-slowing drug.
	await expect(page.getByText(/rose by 13 .*12/).first()).toBeVisible();
	await page.getByRole('button', { name: 'Record the session' }).click();
	await expect(page.getByText('Recorded').first()).toBeVisible();
	await expect(
		day
			.page('nurse')
			.getByText(/128\/74/)
			.first()
	).toBeVisible();
	await goTo(day.page('nurse'), 'Ward');
	await expect(day.page('nurse').getByText(PATIENT).first()).toBeVisible();
}

/** The SMS brings the nurse a link; a look takes nothing; two minutes later they are told again; she takes it. */
export async function callAndTake(day: Day): Promise<void> {
	const raising = day.page('therapist');
	await raising.getByRole('link', { name: 'Escalate' }).first().click();
	await expect(raising.getByText(/Collapsed, or getting worse fast/)).toBeVisible();
	await expect(raising.getByLabel(/Situation|Assessment/).first()).toHaveValue(/128|108/);
	await raising.getByRole('radio', { name: /High/ }).check();
	await raising.getByRole('button', { name: 'Raise it' }).click();
	await expect(raising).toHaveURL(/escalations/);

	const text = await textArrives(day.product.smsUrl, /Rona Ferris/, /T21/);
	expect(text.body).toContain('Tern Ward');
	expect(text.body).not.toMatch(SECRET);
	const link = /https?:\S+\/t\/\S+/.exec(text.body)?.[0] ?? '';

	// A preview, a scanner, a curious look: by GET and HEAD, with and without a sign-in.
	const cookie = (await day.seats.nurse.context.cookies())
		.map(({ name, value }) => `${name}=${value}`)
		.join('; ');
	for (const headers of [undefined, { cookie }]) {
		for (const method of ['GET', 'HEAD']) {
			expect((await fetch(link, { method, ...(headers && { headers }) })).status).toBe(200);
		}
	}
	await expect(raising.getByText(/nobody has it/i).first()).toBeVisible();
	// The surgeon has the thread open on a phone, and hears of it as everybody of the unit does.
	await day.openThread(day.page('surgeon'));
	await day.openThread(day.page('nurse'));
	const strip = day.page('surgeon').getByRole('region', { name: 'Untaken escalations' });
	await expect(strip.getByText(/nobody has it/)).toBeVisible();

	// Two minutes later, still untaken: the nurses are told again, from a timer in the database.
	await day.pass(120_000);
	await textArrives(day.product.smsUrl, /Rona Ferris/, /T21/, 2);

	const phone = await seat(day.browser, day.product.url, null, PHONE);
	await phone.page.goto(link);
	await expect(phone.page.getByText('Tern Ward')).toBeVisible();
	await expect(phone.page.getByText(PATIENT)).toHaveCount(0);
	await phone.page.getByRole('button', { name: 'I take it' }).click();
	await expect(phone.page.getByText('You have it').first()).toBeVisible();
	await expect(raising.getByText(/Rona Ferris has it/).first()).toBeVisible();
	await expect(strip.getByText(/nobody has it/)).toHaveCount(0);
	// By itself, on every page that is open: on her own too, though she took it elsewhere.
	for (const who of ['surgeon', 'nurse'] as const) {
		await expect(day.page(who).getByText('Taken.', { exact: true })).toBeVisible();
	}
	await phone.context.close();
}

/** She goes there and settles it, from her list, and owes a re-check. */
export async function settle(day: Day): Promise<void> {
	const raising = day.page('therapist');
	await goTo(day.page('nurse'), 'Loose ends');
	// Two taps from the list: there, and on to what is to be written.
	await press(rowOf(day.page('nurse')).getByRole('button', { name: /I am there/ }));
	await expect(raising.getByText(/At the bedside since/).first()).toBeVisible();
	await press(rowOf(day.page('nurse')).getByRole('link', { name: /Go on/ }));
	await day.page('nurse').getByRole('button', { name: 'Settle' }).first().click();
	const sheet = day.page('nurse').getByRole('dialog');
	await sheet.getByRole('radio', { name: 'Settled with rest' }).check();
	await sheet.getByLabel(/^Note/).fill('122/70 after five minutes, feels well.');
	await sheet.getByLabel(/Which physician knows/).fill('Marta Lisowska');
	await sheet.getByRole('radio', { name: '15 min' }).check();
	await sheet.getByRole('button', { name: 'Settle' }).click();
	await expect(raising.getByText('Escalation settled').first()).toBeVisible();
	await expect(day.page('surgeon').getByText(/Escalation settled: Settled with rest/)).toBeVisible();
	await goTo(day.page('nurse'), 'Loose ends');
	await expect(rowOf(day.page('nurse'))).toContainText('Measure again');
}
