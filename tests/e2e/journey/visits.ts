import { expect } from '@playwright/test';
import { nextWithinHours } from '../../../src/lib/domain/core/hours';
import { addDays, MINUTE } from '../../../src/lib/domain/core/time';
import { REMINDER_HOURS } from '../../../src/lib/domain/visits/reminders';
import { itemsOf } from '../../support/fakes';
import { mailArrives, textArrives } from '../fakes';
import { DESK, expectConnected, seat } from '../people';
import { MAIL, PATIENT, PHONE_OF_PATIENT, row, SECRET, shown, typed, ZONE, type Day } from './day';

/** A day is closed, and a series that is booked steps over it; a colleague who looks on hears of it. */
export async function bookSeries(day: Day): Promise<void> {
	const page = day.page('coordinator');
	const { monday } = day;
	await page.goto('/visits/closed-days');
	await expectConnected(page);
	await page.getByLabel(/^Day/).fill(typed(addDays(monday, 2)));
	await page.getByLabel(/^Name of the day/).fill('Harbour Day');
	await page.getByRole('button', { name: 'Close this day' }).click();
	await expect(row(page, 'Harbour Day')).toBeVisible();

	const therapist = day.page('therapist');
	await therapist.goto(day.visits);
	await expectConnected(therapist);
	await page.goto(day.visits);
	await expectConnected(page);
	await page.getByRole('button', { name: 'Book a visit' }).click();
	const sheet = page.getByRole('dialog');
	await sheet.getByRole('button', { name: 'Book', exact: true }).click();
	await expect(sheet.getByText('Day: write a day, such as 14 12 2026.')).toBeVisible();
	await expect(sheet.getByLabel(/^Day/)).toBeFocused();
	await sheet.getByRole('radio', { name: 'A series' }).check();
	await sheet.getByLabel(/^From/).fill(typed(monday));
	await sheet.getByLabel(/^Time/).fill('10:00');
	for (const weekday of ['Mon', 'Wed', 'Fri']) {
		await sheet.getByRole('button', { name: weekday, exact: true }).click();
	}
	await sheet.getByLabel(/^Number of visits/).fill('5');
	await sheet.getByRole('combobox', { name: /^Place/ }).selectOption({ label: 'East Gym' });
	await expect(sheet.getByText(/Closed days are left out: .*Harbour Day/)).toBeVisible();
	await sheet.getByRole('button', { name: 'Book', exact: true }).click();
	await expect(page.getByText('Booked: 5.')).toBeVisible();
	for (const [weekday, after] of [
		['Mon', 0],
		['Fri', 4],
		['Mon', 7],
		['Wed', 9],
		['Fri', 11]
	] as const) {
		await expect(row(therapist, shown(weekday, addDays(monday, after)))).toHaveCount(1);
	}
	await expect(row(therapist, shown('Wed', addDays(monday, 2)))).toHaveCount(0);
	await page.goto(`/visits?from=${monday}`);
	await expect(page.getByText(PATIENT).first()).toBeVisible();
	await page.goto(day.visits);
	await expectConnected(page);
}

interface Mail {
	to: string;
	subject: string;
	text: string;
	attachments: { filename: string | null }[];
}

/** The patient has them in the calendar; the surgeon gets a link that asks for the sign-in, and nothing else. */
export async function mailed(day: Day): Promise<void> {
	await mailArrives(day.product.mailUrl, MAIL);
	const mails = await itemsOf<Mail>(`${day.product.mailUrl}/mails`);
	const mine = mails.filter(({ to }) => to.includes(MAIL));
	expect(mine).toHaveLength(1);
	expect(mine[0]?.attachments.map(({ filename }) => filename)).toContain('visit.ics');
	expect(mine[0]?.text).toContain('5 visits are booked for you.');
	expect(`${mine[0]?.subject} ${mine[0]?.text}`).not.toMatch(SECRET);

	const news = await mailArrives(day.product.mailUrl, 'surgeon@saltmarsh.example');
	expect(`${news.subject} ${news.text}`).not.toMatch(SECRET);
	const address = /https?:\S+/.exec(news.text)?.[0] ?? '';
	expect(address).toBe(day.product.url + day.visits);
	const stranger = await seat(day.browser, day.product.url, null, DESK);
	await stranger.page.goto(address);
	await expect(stranger.page).toHaveURL(/\/sign-in/);
	await stranger.context.close();
	const surgeon = day.page('surgeon');
	await surgeon.goto(address);
	await expect(surgeon.getByText(PATIENT).first()).toBeVisible();
}

/** A visit moves, not onto a closed day: the patient is told at daytime, colleagues see it at once. */
export async function move(day: Day): Promise<void> {
	const page = day.page('coordinator');
	const therapist = day.page('therapist');
	const friday = addDays(day.monday, 4);
	const thursday = addDays(day.monday, 3);
	await page.getByRole('button', { name: `Move: ${PATIENT}, ${shown('Fri', friday)} 10:00` }).click();
	const sheet = page.getByRole('dialog');
	await sheet.getByLabel(/^Day/).fill(typed(addDays(day.monday, 2)));
	await sheet.getByRole('button', { name: 'Move the visit' }).click();
	await expect(sheet.getByText(/is a closed day/)).toBeVisible();
	await sheet.getByLabel(/^Day/).fill(typed(thursday));
	await sheet.getByLabel(/^Time/).fill('1430');
	await sheet.getByRole('button', { name: 'Move the visit' }).click();
	await expect(page.getByText('Moved. The patient is being told.')).toBeVisible();
	await expect(row(therapist, shown('Thu', thursday))).toHaveCount(1);
	await expect(row(therapist, shown('Fri', friday))).toHaveCount(0);

	// Up to here no browser complained; what comes now ends their sign-ins, and they say so.
	expect(Object.values(day.seats).flatMap(({ complaints }) => complaints)).toEqual([]);
	// Whatever the hour is now, a text waits for the daytime.
	await day.until(nextWithinHours(day.now + MINUTE, ZONE, REMINDER_HOURS));
	const text = await textArrives(day.product.smsUrl, PHONE_OF_PATIENT, /MOVED/);
	expect(text.body).toContain(`${shown('Thu', thursday)} 14:30`);
	expect(text.body).not.toMatch(SECRET);
	await day.pass(13 * 60 * MINUTE);
	await expect(therapist.getByText('Your sign-in has ended')).toBeVisible({ timeout: 30_000 });
}
