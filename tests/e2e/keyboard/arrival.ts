import { expect } from '@playwright/test';
import { addDays, localDateOf } from '../../../src/lib/domain/core/time';
import { typed, ZONE } from '../journey/day';
import { BED, PATIENT, rowsOf, type Shift } from './shift';

/** The coordinator admits the patient, operated on four days ago. */
export async function admitPatient(shift: Shift): Promise<void> {
	const { coordinator } = shift;
	const { page } = coordinator;
	await coordinator.goTo('Ward', /\/ward$/);
	await coordinator.press(page.getByRole('link', { name: 'Admit a patient' }));
	await coordinator.arrive(/\/ward\/admit/);
	const part = (name: RegExp) => page.getByRole('group', { name });
	await coordinator.type(page.getByLabel(/^Name/), PATIENT);
	await coordinator.type(page.getByLabel(/^Hospital number/), 'SG-K1');
	await coordinator.type(page.getByLabel(/^Birth date/), '12 3 1951');
	await coordinator.pick(page.getByLabel(/^Sex/), 'Female');
	await coordinator.pick(page.getByLabel(/^Unit/), 'Tern Ward');
	await coordinator.type(page.getByLabel(/^Bed/), BED);
	await coordinator.choose(part(/^Level/), '3');
	await coordinator.type(page.getByLabel(/^Procedure/), 'Bypass');
	await coordinator.pick(page.getByLabel(/^Approach/), 'Sternotomy');
	const operatedOn = addDays(localDateOf(Date.now(), ZONE), -4);
	await coordinator.type(part(/^Operation/).getByLabel(/^Day/), typed(operatedOn));
	await coordinator.type(part(/^Operation/).getByLabel(/^Time/), '9:30');
	await coordinator.press(page.getByRole('button', { name: 'Admit', exact: true }));
	await coordinator.arrive(/\/patients\/[\w-]{36}$/);
	await expect(page.getByRole('heading', { level: 1, name: PATIENT })).toBeAttached();
	shift.episodeId = new URL(page.url()).pathname.split('/').at(-1) ?? '';
}

/** The surgeon finds the patient on the ward and refers. */
export async function referPatient(shift: Shift): Promise<void> {
	const surgeon = await shift.at('surgeon');
	const { page } = surgeon;
	await surgeon.goTo('Ward', /\/ward$/);
	await surgeon.press(
		page.getByRole('navigation', { name: 'Units' }).getByRole('link', { name: 'Tern Ward' })
	);
	await surgeon.arrive(/\/ward\?/);
	await surgeon.press(page.getByRole('table').getByRole('link', { name: new RegExp(PATIENT) }));
	await surgeon.arrive(new RegExp(`/patients/${shift.episodeId}$`));
	await surgeon.press(page.getByRole('main').getByRole('link', { name: 'Refer' }));
	await surgeon.arrive(/\/refer$/);
	await surgeon.choose(page.getByRole('group', { name: /^Service/ }), 'Physiotherapy');
	await surgeon.choose(page.getByRole('group', { name: /^How soon/ }), 'Soon');
	await surgeon.type(page.getByLabel(/^What you ask/), 'Begin to mobilise, slow at first.');
	await surgeon.press(page.getByRole('button', { name: 'Refer', exact: true }));
	await surgeon.arrive(/\/threads\//);
}

/** Taken on, the patient is asked about: in the thread, with a question to the therapist by name. */
export async function askByName({ surgeon, therapist }: Shift): Promise<void> {
	const { page } = surgeon;
	await surgeon.type(page.getByRole('textbox', { name: 'Write into the thread' }), 'Who goes to her today?');
	await surgeon.pick(page.getByLabel('A question to'), 'Ivo Aldous');
	await surgeon.press(page.getByRole('button', { name: 'Send' }), 'Enter', 'Shift+Tab');
	await expect(page.getByRole('main').getByText('Who goes to her today?')).toBeVisible();
	await surgeon.isSomewhere();
	await expect(rowsOf(therapist.page).filter({ hasText: BED })).toContainText('Who goes to her today?');
}
