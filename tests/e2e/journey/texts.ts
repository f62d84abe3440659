import { expect } from '@playwright/test';
import { addDays, instantOf } from '../../../src/lib/domain/core/time';
import { reply, textArrives, textsTo } from '../fakes';
import {
	goTo,
	NUMBER,
	PATIENT,
	PHONE_OF_PATIENT,
	press,
	row,
	rowOf,
	SECRET,
	shown,
	ZONE,
	type Day
} from './day';

const says = (day: Day, body: string) => reply(day.product.smsUrl, NUMBER, body);
const arrives = (day: Day, wanted: RegExp) => textArrives(day.product.smsUrl, PHONE_OF_PATIENT, wanted);
const remindersOf = async (day: Day, when: string) =>
	(await textsTo(day.product.smsUrl, PHONE_OF_PATIENT)).filter(({ body }) =>
		body.includes(`your visit is ${when}`)
	);

/** The evening before a visit, when its reminder has gone if one goes. */
const dayBefore = (day: Day, after: number) => instantOf(addDays(day.monday, after - 1), '17:01', ZONE);

/** The day before, the phone is reminded once, and who has said yes is not asked again; on the day a nurse marks it. */
export async function remindAndAttend(day: Day): Promise<void> {
	const when = shown('Mon', day.monday);
	await day.until(dayBefore(day, 0));
	const text = await arrives(day, new RegExp(`your visit is ${when}`));
	expect(text.body).toContain('Reply NO if you cannot come');
	expect(text.body).not.toMatch(SECRET);
	await day.until(instantOf(day.monday, '10:05', ZONE));
	expect(await remindersOf(day, when)).toHaveLength(1);

	const nurse = await day.back('nurse', day.visits);
	await nurse.getByRole('button', { name: `Attended: ${PATIENT}, ${when} 10:00` }).click();
	await expect(row(nurse, when)).toContainText('attended');
}

/** HELP is answered; after STOP nothing comes any more; START brings the texts back. */
export async function stopAndStart(day: Day): Promise<void> {
	await says(day, 'help');
	expect((await arrives(day, /Reply YES, NO, or STOP/)).body).toContain('In an emergency call');
	await says(day, 'no more texts please');
	await arrives(day, /no more texts will come/);
	const before = (await textsTo(day.product.smsUrl, PHONE_OF_PATIENT)).length;
	await day.until(dayBefore(day, 7));
	// The worker has had the reminder in hand, and left it: the list says why.
	const page = await day.back('coordinator', day.visits);
	const monday = row(page, shown('Mon', addDays(day.monday, 7)));
	await expect(monday).toContainText('the patient asked for no more texts');
	expect(await textsTo(day.product.smsUrl, PHONE_OF_PATIENT)).toHaveLength(before);
	await says(day, 'START');
	await arrives(day, /texts about your visits will come again/);
}

/** What no rule understands is answered once, and is a loose end until a person has read it and says what was done. */
export async function readByPerson(day: Day): Promise<void> {
	const page = day.page('coordinator');
	await goTo(page, 'Loose ends');
	await says(day, 'Is the lift by the gym working?');
	await arrives(day, /A person will read it/);
	const end = rowOf(page).filter({ hasText: 'A text message wants an answer' });
	await expect(end).toHaveCount(1);
	await press(end.getByRole('link', { name: /Read/ }));
	await expect(page.getByText('Is the lift by the gym working?')).toBeVisible();
	await page.getByLabel(/^What was done about it/).fill('Called: it works.');
	await page.getByRole('button', { name: 'I have seen to it' }).click();
	await expect(page).toHaveURL(/loose-ends$/);
	await expect(end).toHaveCount(0);
}

/** Who does not come is marked missed; the next visit is confirmed by text, and the page shows it at once. */
export async function missAndConfirm(day: Day): Promise<void> {
	const missed = shown('Mon', addDays(day.monday, 7));
	await day.until(instantOf(addDays(day.monday, 7), '10:30', ZONE));
	const page = await day.back('coordinator', day.visits);
	await page.getByRole('button', { name: `Missed: ${PATIENT}, ${missed} 10:00` }).click();
	await expect(row(page, missed)).toContainText('missed');

	const when = shown('Wed', addDays(day.monday, 9));
	await day.until(dayBefore(day, 9));
	expect((await arrives(day, new RegExp(`your visit is ${when}`))).body).toContain('Reply YES or NO');
	await day.back('coordinator', day.visits);
	await says(day, 'Yes!');
	await expect(row(page, when)).toContainText('confirmed');
	await arrives(day, new RegExp(`thank you, see you ${when} 10:00, East Gym`));
}

/** The last one is cancelled by text. */
export async function declineByText(day: Day): Promise<void> {
	const when = shown('Fri', addDays(day.monday, 11));
	await day.until(dayBefore(day, 11));
	await arrives(day, new RegExp(`your visit is ${when}`));
	await day.back('coordinator', day.visits);
	await says(day, 'Sorry, no.');
	await arrives(day, new RegExp(`${when} 10:00 is cancelled. We will call`));
	await expect(row(day.page('coordinator'), when)).toContainText('cancelled');
}
