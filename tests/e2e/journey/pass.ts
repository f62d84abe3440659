import { expect } from '@playwright/test';
import { signInAs } from '../../support/api';
import { textsTo } from '../fakes';
import { goTo, press, rowOf, type Day } from './day';

/** Told in person: who stands beside takes it with one tap and no chain runs; passed on, it stays until confirmed. */
export async function tellAndPass(day: Day): Promise<void> {
	const raising = day.page('therapist');
	const before = (await textsTo(day.product.smsUrl, /./)).length;
	await day.openPatient(raising);
	await raising.getByRole('link', { name: 'Escalate' }).first().click();
	await raising.getByRole('radio', { name: /Medium/ }).check();
	for (const [part, words] of [
		[/^Situation/, 'Pale after the corridor.'],
		[/^Background/, 'Fourth day.'],
		[/^Assessment/, 'Tired, not falling.'],
		[/^Request/, 'Please look at her.']
	] as const) {
		await raising.getByLabel(part).fill(words);
	}
	await raising.getByLabel(/^Told in person/).selectOption({ label: 'Rona Ferris, nurse' });
	await raising.getByRole('button', { name: 'Raise it' }).click();
	await expect(raising.getByText('told Rona Ferris in person.').first()).toBeVisible();

	const nurse = day.page('nurse');
	await goTo(nurse, 'Loose ends');
	await press(
		rowOf(nurse)
			.filter({ hasText: 'Pale after the corridor.' })
			.getByRole('button', { name: /I take it/ })
	);
	await expect(raising.getByText(/Rona Ferris has it/).first()).toBeVisible();
	// No chain ran: nobody was called by telephone.
	expect((await textsTo(day.product.smsUrl, /./)).length).toBe(before);

	await nurse.goto(new URL(raising.url()).pathname);
	await nurse.getByRole('button', { name: 'Pass it on' }).click();
	const sheet = nurse.getByRole('dialog');
	await sheet.getByRole('radio', { name: /Marta Lisowska/ }).check();
	await sheet.getByLabel(/^Reason/).fill('Needs a physician.');
	await sheet.getByRole('button', { name: 'Pass it on' }).click();
	await expect(
		raising.getByText(/Passed on to Marta Lisowska, who has not confirmed yet/).first()
	).toBeVisible();
	await expect(raising.getByText(/Rona Ferris has it/).first()).toBeVisible();

	const physician = day.page('physician');
	await goTo(physician, 'Loose ends');
	await press(rowOf(physician).getByRole('button', { name: /I have it now/ }));
	await expect(raising.getByText(/Marta Lisowska has it/).first()).toBeVisible();
	await physician.goto(new URL(raising.url()).pathname);
	await physician.getByRole('button', { name: 'Settle' }).first().click();
	const settling = physician.getByRole('dialog');
	await settling.getByRole('radio', { name: 'Settled with rest' }).check();
	await settling.getByLabel(/^Note/).fill('Sat out, well again.');
	await settling.getByRole('button', { name: 'Settle' }).click();
	await expect(raising.getByText('Escalation settled').first()).toBeVisible();
}

const MINUTE = 60_000;

/** What was done without a clearance is recorded all the same, marked, and the decider says that it was seen. */
export async function deviate(day: Day): Promise<void> {
	const therapist = await signInAs(day.product.url, 'therapist');
	const ago = (minutes: number) => new Date(day.now - minutes * MINUTE).toISOString();
	const reading = { posture: 'sitting', hr: 78, sbp: 124, dbp: 70, spo2: 96, rr: 16, rpe: 11, pain: 1 };
	const session = {
		context: { betaBlocked: true, rhythm: 'sinus', sternotomy: true, level: 6, conscious: true },
		before: reading,
		during: [],
		after: reading,
		symptoms: [],
		activities: [{ code: 'treadmill-walk', minutes: 5 }],
		startedAt: ago(20),
		endedAt: ago(5),
		level: 6
	};
	const path = `/api/episodes/${day.episodeId}/sessions`;
	const refused = await therapist.post(path, session);
	expect([refused.status, refused.body.type]).toEqual([409, 'clearance-needed']);
	const deviation = { reason: 'She asked for it.', verbalFrom: 'the surgeon', readBack: true };
	expect((await therapist.post(path, { ...session, deviation })).status).toBe(201);

	const surgeon = day.page('surgeon');
	await goTo(surgeon, 'Loose ends');
	const seen = rowOf(surgeon).getByRole('button', { name: /^Seen/ });
	await expect(seen).toHaveCount(1);
	await press(seen);
	await expect(seen).toHaveCount(0);
}
