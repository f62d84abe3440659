import { expect } from '@playwright/test';
import { addDays, localDateOf } from '../../../src/lib/domain/core/time';
import { typed, ZONE } from '../journey/day';
import type { Keyboard } from './keyboard';
import { BED, PATIENT, rowsOf, type Shift } from './shift';

/** The surgeon clears it to 90 degrees, and the thread of the therapist says so. */
export async function clearIt(shift: Shift): Promise<void> {
	const { surgeon } = shift;
	const { page } = surgeon;
	await surgeon.goTo('Loose ends', /\/loose-ends/);
	const row = rowsOf(page).filter({ hasText: BED }).filter({ hasText: 'Arm stage' });
	await surgeon.reach(rowsOf(page).locator('[data-row-step]').first());
	await surgeon.goDown(row.getByRole('link', { name: /^Answer/ }));
	await page.keyboard.press('Enter');
	await surgeon.arrive(/\/clearances\//);
	await surgeon.choose(page.getByRole('group', { name: /^Arms up to/ }), '90°');
	await surgeon.press(page.getByRole('button', { name: 'Clear, to 90 degrees' }));
	await expect(page.locator('#stand')).toBeFocused();
	await surgeon.isSomewhere();
	await expect(shift.therapist.page.getByText(/Cleared with limits.*90 degrees/).first()).toBeVisible();
}

/** The nurse takes the call from home, is there, and settles it. */
export async function takeAndSettle(shift: Shift): Promise<void> {
	const nurse = await shift.at('nurse');
	const { page } = nurse;
	await nurse.press(
		rowsOf(page)
			.filter({ hasText: BED })
			.getByRole('button', { name: /^I take it/ })
	);
	await nurse.arrive(/\/escalations\//);
	await nurse.press(page.getByRole('button', { name: 'I am at the bedside' }));
	await expect(page.getByText(/At the bedside since/).first()).toBeVisible();
	await nurse.isSomewhere();
	await settle(nurse);
}

/** A sheet that is left gives the focus back to its button; that button gone, the state of the call has it. */
async function settle(nurse: Keyboard): Promise<void> {
	const { page } = nurse;
	const opener = page.getByRole('main').getByRole('button', { name: 'Settle' });
	await nurse.press(opener);
	const sheet = page.getByRole('dialog');
	await expect(sheet).toBeVisible();
	await page.keyboard.press('Escape');
	await expect(sheet).toBeHidden();
	await expect(opener).toBeFocused();
	await page.keyboard.press('Enter');
	await nurse.choose(sheet.getByRole('group', { name: /^Outcome/ }), 'Settled with rest');
	await nurse.type(sheet.getByLabel(/^Note/), '122/70 after five minutes.');
	await nurse.type(sheet.getByLabel(/Which physician knows/), 'Marta Lisowska');
	await nurse.choose(sheet.getByRole('group', { name: /^Measure again in/ }), '15 min');
	await nurse.press(sheet.getByRole('button', { name: 'Settle' }));
	await expect(sheet).toBeHidden();
	await expect(page.getByText('Escalation settled').first()).toBeVisible();
	await expect(page.locator('#state')).toBeFocused();
	await nurse.isSomewhere();
}

/** The coordinator books a visit, and signs out. */
export async function bookAndSignOut(shift: Shift): Promise<void> {
	const { coordinator } = shift;
	const { page } = coordinator;
	await coordinator.goTo('Visits', /\/visits/);
	const book = page.getByRole('button', { name: 'Book a visit' });
	await coordinator.press(book);
	const sheet = page.getByRole('dialog');
	await expect(sheet).toBeVisible();
	await page.keyboard.press('Escape');
	await expect(sheet).toBeHidden();
	await expect(book).toBeFocused();
	await page.keyboard.press('Enter');
	await coordinator.pick(sheet.getByLabel(/^Patient/), PATIENT.slice(0, 6));
	await coordinator.type(sheet.getByLabel(/^Day/), typed(addDays(localDateOf(Date.now(), ZONE), 10)));
	await coordinator.type(sheet.getByLabel(/^Time/), '10:00');
	await coordinator.press(sheet.getByRole('button', { name: 'Book', exact: true }));
	await expect(page.getByText('Booked: 1.')).toBeVisible();
	await coordinator.isSomewhere();
	await expect(book).toBeFocused();
	await signOut(coordinator);
}

/** Behind one's name, in a panel that gives the focus back when it is left. */
async function signOut(person: Keyboard): Promise<void> {
	const { page } = person;
	const more = page.getByRole('banner').getByRole('button').last();
	await person.reach(more, 'Shift+Tab');
	await page.keyboard.press('Enter');
	const panel = page.getByRole('region', { name: 'More' });
	await expect(panel).toBeVisible();
	await page.keyboard.press('Escape');
	await expect(panel).toBeHidden();
	await expect(more).toBeFocused();
	await page.keyboard.press('Enter');
	await person.press(panel.getByRole('button', { name: 'Sign out' }));
	await expect(page.getByRole('link', { name: 'Sign in' }).first()).toBeVisible();
	await page.goto('/loose-ends');
	await expect(page).toHaveURL(/\/sign-in/);
}
