import { expect } from '@playwright/test';
import { PHONE } from '../people';
import { goTo, press, rowOf, type Day } from './day';

/** The surgeon asks, the therapist sees it arrive and accepts, both talk, the nurse reads along. */
export async function refer(day: Day): Promise<void> {
	const page = day.page('surgeon');
	await day.openPatient(page);
	await page.getByRole('main').getByRole('link', { name: 'Refer' }).click();
	await page.getByRole('radio', { name: 'Physiotherapy' }).check();
	await page.getByRole('radio', { name: 'Soon' }).check();
	await page.getByLabel(/What you ask/).fill('Begin to mobilise, four grafts, slow at first.');
	await page.getByRole('button', { name: /refer/i }).click();
	await expect(page).toHaveURL(/threads/);
	day.thread = new URL(page.url()).pathname;

	await press(rowOf(day.page('therapist')).getByRole('button', { name: /Accept/ }));
	await expect(rowOf(day.page('therapist'))).toHaveCount(0);
	await expect(page.getByText('Accepted.', { exact: true })).toBeVisible();

	await day.openThread(day.page('nurse'));
	await day.openThread(day.page('therapist'));
	await day
		.page('therapist')
		.getByPlaceholder(/Write into the thread/)
		.fill('Seen at 11, sitting out twice.');
	await day.page('therapist').getByRole('button', { name: 'Send' }).click();
	for (const reader of ['surgeon', 'nurse', 'therapist'] as const) {
		await expect(day.page(reader).getByText('Seen at 11, sitting out twice.')).toBeVisible();
	}
}

/** The therapist asks for the arm stage, the surgeon clears it to 90 degrees. */
export async function clear(day: Day): Promise<void> {
	const asking = day.page('therapist');
	await goTo(day.page('surgeon'), 'Loose ends');
	await asking.getByText('Ask for a clearance').click();
	await asking.getByLabel(/For what/).selectOption('arm-stage');
	await asking.getByLabel(/What you ask/).fill('Wound dry, breastbone stable. May it start?');
	await asking.getByRole('button', { name: 'Ask', exact: true }).click();

	const asked = rowOf(day.page('surgeon'));
	await expect(asked).toContainText('Arm stage');
	await press(asked.getByRole('link', { name: /Answer/ }));
	await expect(day.page('surgeon').getByText('May the arm stage start?')).toBeVisible();
	await expect(day.page('surgeon').getByText('born 12 Mar 1951').first()).toBeVisible();
	// What it rests on is readable on a phone: within its width, without scrolling sideways.
	const evidence = day.page('surgeon').getByText('What it rests on').first();
	await expect(evidence).toBeVisible();
	expect(await day.page('surgeon').evaluate(() => document.documentElement.scrollWidth)).toBe(PHONE.width);
	await day.page('surgeon').getByRole('radio', { name: '90°' }).check();
	await day.page('surgeon').getByRole('button', { name: 'Clear, to 90 degrees' }).click();

	await expect(asking.getByText(/Cleared with limits.*90 degrees/).first()).toBeVisible();
	await expect(
		day
			.page('nurse')
			.getByText(/Cleared with limits.*90 degrees/)
			.first()
	).toBeVisible();
}

/** What policy leaves to others: the stairs are the physician's to clear, the swallow the speech therapist's. */
export async function clearByOthers(day: Day): Promise<void> {
	const asking = day.page('therapist');
	for (const [kind, who, question] of [
		['stairs', 'physician', 'Six steps went well. May she?'],
		['oral-intake', 'speech-therapist', 'Voice is back. May she drink?']
	] as const) {
		const page = day.page(who);
		await asking.getByLabel(/For what/).selectOption(kind);
		await asking.getByLabel(/What you ask/).fill(question);
		await asking.getByRole('button', { name: 'Ask', exact: true }).click();
		const asked = rowOf(page).filter({ hasText: question });
		await expect(asked).toHaveCount(1);
		await press(asked.getByRole('link', { name: /Answer/ }));
		await expect(page.getByText(question).first()).toBeVisible();
		if (kind === 'stairs') {
			await page.getByRole('radio', { name: 'two helpers' }).check();
			await page.getByRole('button', { name: 'Clear, with two helpers' }).click();
			await expect(asking.getByText(/^Stairs: Cleared with limits\. .*two helpers/)).toBeVisible();
		} else {
			await page.getByRole('button', { name: 'Clear', exact: true }).click();
			await expect(asking.getByText('Eating and drinking: Cleared.')).toBeVisible();
		}
		await goTo(page, 'Loose ends');
		await expect(rowOf(page).filter({ hasText: question })).toHaveCount(0);
	}
}
