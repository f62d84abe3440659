import { expect } from '@playwright/test';
import { WIDE } from '../access';
import type { Keyboard } from './keyboard';
import { BED, OTHER_BED, PATIENT, rowsOf, type Shift } from './shift';

/** The focus goes from row to row by arrow keys, and to the first and the last. */
export async function walkRows(shift: Shift): Promise<void> {
	const { therapist } = shift;
	const { page } = therapist;
	const steps = rowsOf(page).locator('[data-row-step]');
	await therapist.reach(steps.first());
	const count = await steps.count();
	expect(count).toBeGreaterThan(2);
	for (const [key, row] of [
		['ArrowDown', 1],
		['ArrowDown', 2],
		['ArrowUp', 1],
		['End', count - 1],
		['ArrowDown', count - 1],
		['Home', 0]
	] as const) {
		await page.keyboard.press(key);
		await expect(steps.nth(row)).toBeFocused();
	}
}

/** A row is done with where it stands, and the row that comes into its place has the focus. */
export async function doneInPlace(shift: Shift): Promise<void> {
	const { therapist } = shift;
	const { page } = therapist;
	const asked = rowsOf(page).filter({ hasText: OTHER_BED });
	const accept = asked.getByRole('button', { name: /^Accept/ });
	await therapist.goDown(accept);
	await page.keyboard.press('Enter');
	await expect(asked).toHaveCount(0);
	await therapist.isSomewhere();
	const row = page.locator('li:focus');
	const step = (await row.locator('[data-row-step]').getAttribute('aria-label')) ?? '';
	// No letter alone does anything anywhere, so that none that is meant for a field is taken for a deed.
	const before = [page.url(), await rowsOf(page).allInnerTexts()];
	await page.keyboard.type('abcdefghijklmnopqrstuvwxyz/?');
	expect([page.url(), await rowsOf(page).allInnerTexts()]).toEqual(before);
	await expect(row).toHaveCount(1);
	await page.keyboard.press('ArrowDown');
	await expect(page.getByLabel(step, { exact: true })).toBeFocused();
	const mine = rowsOf(page).filter({ hasText: BED });
	await therapist.goDown(mine.getByRole('button', { name: /^Accept/ }));
	await page.keyboard.press('Enter');
	await expect(mine).toHaveCount(0);
	await therapist.isSomewhere();
}

/** From the row to the thread, an answer there, and on to the patient and to the bedside. */
export async function replyAndGoOn(shift: Shift): Promise<void> {
	const { therapist } = shift;
	const { page } = therapist;
	await therapist.goDown(
		rowsOf(page)
			.filter({ hasText: BED })
			.getByRole('link', { name: /^Answer/ })
	);
	await page.keyboard.press('Enter');
	await therapist.arrive(/\/threads\//);
	const composer = page.getByRole('textbox', { name: 'Write into the thread' });
	await therapist.type(composer, 'I do, at eleven.');
	await page.keyboard.press('ControlOrMeta+Enter');
	await expect(page.getByRole('main').getByText('I do, at eleven.')).toBeVisible();
	await expect(composer).toHaveValue('');
	await expect(composer).toBeFocused();
	await toBedside(shift);
}

/** From a page of the patient over the nameboard to them, and on to the bedside. */
async function toBedside({ therapist, episodeId }: Shift): Promise<void> {
	const { page } = therapist;
	await therapist.press(page.getByRole('link', { name: new RegExp(PATIENT) }), 'Enter', 'Shift+Tab');
	await therapist.arrive(new RegExp(`/patients/${episodeId}$`));
	await therapist.press(page.getByRole('link', { name: 'Record a session' }));
	await therapist.arrive(/\/bedside\//);
}

/** Readings are typed, a rule stops the patient while they are, and the session is recorded. */
export async function recordSession({ therapist }: Shift): Promise<void> {
	const { page } = therapist;
	await typeReadings(therapist);
	await therapist.press(page.getByRole('button', { name: 'Record the session' }));
	await expect(page.getByRole('heading', { name: /^Recorded/ })).toBeFocused();
}

/** A second time the readings stop the patient, and the stop itself leads to the call, filled in. */
export async function raiseFromStop(shift: Shift): Promise<void> {
	const { therapist } = shift;
	const { page } = therapist;
	await toBedside(shift);
	await typeReadings(therapist);
	// From the last value that brought the stop, past all that could still be typed.
	await therapist.press(page.getByRole('link', { name: 'Go on to the stop' }).last());
	await therapist.press(page.getByRole('alert').getByRole('button', { name: 'Escalate' }));
	await therapist.arrive(/\/escalate/);
	await expect(page.getByLabel(/^Situation/)).toHaveValue(/128.*108/);
	await therapist.choose(page.getByRole('group', { name: /^How urgent/ }), /^High/);
	await therapist.press(page.getByRole('button', { name: 'Raise it' }));
	await therapist.arrive(/\/escalations\//);
	await expect(page.getByText('nobody has it yet').first()).toBeVisible();
}

async function typeReadings(therapist: Keyboard): Promise<void> {
	const { page } = therapist;
	// Two columns, and a stop that lies over the lower part of both.
	await page.setViewportSize(WIDE);
	const group = (name: RegExp) => page.getByRole('group', { name });
	const reading = (name: string) => page.getByRole('textbox', { name: new RegExp(`^${name}`) });
	await therapist.choose(group(/^The patient/), 'awake, follows commands');
	await therapist.choose(group(/^Rate-slowing drug/), 'yes');
	await therapist.choose(group(/^Rhythm/), 'sinus');
	await therapist.press(page.getByRole('link', { name: 'Go on to the readings' }));
	await therapist.type(reading('Systolic'), '128');
	await therapist.type(reading('Diastolic'), '74');
	await therapist.type(reading('Pulse'), '76');
	await therapist.reach(page.getByRole('tab', { name: /Before/ }), 'Shift+Tab');
	await page.keyboard.press('End');
	await expect(page.getByRole('tab', { name: /After/ })).toBeFocused();
	await therapist.type(reading('Systolic'), '108');
	await expect(page.getByText('Stop. Sit the patient down.').first()).toBeVisible();
	await therapist.isSomewhere();
	await expect(reading('Systolic')).toBeFocused();
	await therapist.type(reading('Diastolic'), '66');
	await therapist.type(reading('Pulse'), '89');
}

/** From the session to the thread, and there for a clearance. */
export async function askForClearance(shift: Shift): Promise<void> {
	const { therapist } = shift;
	const { page } = therapist;
	await therapist.press(page.getByRole('link', { name: 'The thread', exact: true }));
	await therapist.arrive(/\/threads\//);
	await therapist.press(page.locator('summary', { hasText: 'Ask for a clearance' }));
	await therapist.pick(page.getByLabel(/For what/), 'Arm st');
	await therapist.type(page.getByLabel(/What you ask/), 'Wound dry. May it start?');
	const ask = page.getByRole('button', { name: 'Ask', exact: true });
	await therapist.press(ask);
	await expect(page.getByRole('main').getByText('Wound dry. May it start?').first()).toBeVisible();
	await expect(ask).toBeFocused();
	await therapist.isSomewhere();
}
