import { expect } from '@playwright/test';
import { addDays, localDateOf } from '../../../src/lib/domain/core/time';
import { expectConnected } from '../people';
import { typed, ZONE, type Day } from './day';

/** The therapist takes today's level back, and whoever has the patient open reads it at once. */
export async function decideLevel(day: Day): Promise<void> {
	const page = day.page('therapist');
	const reader = day.page('nurse');
	for (const each of [page, reader]) {
		await each.goto(`/patients/${day.episodeId}/level`);
		await expectConnected(each);
	}
	await page.getByRole('radio', { name: '3', exact: true }).check();
	await page.getByLabel(/^Reason/).fill('Pale in the corridor: the room is enough today.');
	await page.getByRole('button', { name: 'Decide', exact: true }).click();
	await expect(page.getByText('Decided: level 3.')).toBeVisible();
	await expect(reader.getByRole('heading', { name: 'Level 3 today' })).toBeVisible();
	await expect(reader.getByText('Pale in the corridor: the room is enough today.')).toBeVisible();
}

/** The physician narrows one limit for this patient, found by typing a part of its name. */
export async function narrowLimit(day: Day): Promise<void> {
	const page = day.page('physician');
	await page.goto(`/patients/${day.episodeId}/limits`);
	await expectConnected(page);
	// The finder comes once somebody comes near; until then it is the browser's own list.
	await page.locator('select[name=key]').hover();
	const limit = page.locator('input[role=combobox]');
	await limit.fill('fall systolic');
	await page.getByRole('option', { name: /^Fall of the systolic pressure \(Stop/ }).click();
	await expect(limit).toHaveValue(/^Fall of the systolic pressure \(Stop/);
	await page.getByLabel(/^New value/).fill('6');
	await page.getByLabel(/^Reason/).fill('Tight left main.');
	await page.getByLabel(/^Last day/).fill(typed(addDays(localDateOf(day.now, ZONE), 3)));
	await page.getByRole('button', { name: 'Set the limit' }).click();
	await expect(page.getByText('Set. Sessions from now on are judged by it.')).toBeVisible();
	await expect(page.getByRole('listitem').filter({ hasText: 'Tight left main.' })).toContainText(
		/Fall of the systolic pressure.*: 6/
	);
}
