import { expect, test, type Page } from '@playwright/test';
import { addDays, instantOf, localDateOf } from '../../src/lib/domain/core/time';
import { admit, signInAs } from '../support/api';
import { startProduct, type Product } from '../support/server';
import { mailArrives, reply, textArrives } from './fakes';
import { DESK, expectConnected, PHONE, seat, signIn, type Seat } from './people';

const PATIENT = 'Orla Penhale';
const NUMBER = '+353865551234';
const ZONE = 'Europe/Dublin';

let product: Product;
let surgeon: Seat;
let therapist: Seat;
let nurse: Seat;
let coordinator: Seat;
let episodeId: string;
let thread: string;

// The steps build on each other as a working day does, so one that fails ends the journey.
test.describe.configure({ mode: 'serial' });

test.beforeAll(async ({ browser }) => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	const desk = await signInAs(product.url, 'coordinator');
	episodeId = await admit(desk, {
		patient: {
			name: PATIENT,
			birthDate: '1951-03-12',
			sex: 'female',
			mrn: 'SG-77001',
			phone: NUMBER,
			smsConsent: true
		},
		bed: 'T21',
		level: 4,
		betaBlocked: true,
		rhythm: 'sinus'
	});
	[surgeon, therapist, nurse, coordinator] = await Promise.all([
		seat(browser, product.url, 'surgeon', PHONE),
		seat(browser, product.url, 'therapist', DESK),
		seat(browser, product.url, 'nurse', PHONE),
		seat(browser, product.url, 'coordinator', DESK)
	]);
});

test.afterAll(async () => {
	await Promise.all([surgeon, therapist, nurse, coordinator].map((each) => each?.context.close()));
	await product?.stop();
});

/** A field of the reading that is open; the other moments' fields are there but hidden. */
const reading = (page: Page, name: string) => page.getByRole('textbox', { name: new RegExp(`^${name}`) });

/** The row of this journey's patient in a list of loose ends. */
const rowOf = (page: Page) => page.getByRole('listitem').filter({ hasText: PATIENT });

/** One of the places of the navigation, at the top of a desk or under the thumb on a phone. */
async function goTo(page: Page, place: 'Loose ends' | 'Ward'): Promise<void> {
	await page.getByRole('navigation', { name: 'Places' }).getByRole('link', { name: place }).click();
}

/** This journey's patient, from wherever one is. */
async function openPatient(page: Page): Promise<void> {
	await goTo(page, 'Ward');
	// The page before it may have a loose end of the same name.
	await expect(page).toHaveURL(/\/ward/);
	await page.getByRole('link', { name: new RegExp(PATIENT) }).click();
	await expect(page).toHaveURL(new RegExp(`/patients/${episodeId}$`));
}

async function openThread(page: Page): Promise<void> {
	await openPatient(page);
	await page.getByRole('main').getByRole('link', { name: 'Physiotherapy' }).click();
	await expect(page).toHaveURL(/threads/);
}

/** A page of this patient, by the bar of their pages. */
async function openVisits(page: Page): Promise<void> {
	await openPatient(page);
	const pages = page.getByRole('navigation', { name: 'Pages of this patient' });
	await pages.getByRole('link', { name: 'Visits' }).click();
	await expect(page).toHaveURL(/visits/);
}

test('refer: the surgeon asks, the therapist sees it arrive and accepts, both talk, the nurse reads along', async () => {
	const { page } = surgeon;
	await openPatient(page);
	await page.getByRole('main').getByRole('link', { name: 'Refer' }).click();
	await page.getByRole('radio', { name: 'Physiotherapy' }).check();
	await page.getByRole('radio', { name: 'Soon' }).check();
	await page.getByLabel(/What do you ask/).fill('Begin to mobilise, four grafts, slow at first.');
	await page.getByRole('button', { name: /refer/i }).click();
	await expect(page).toHaveURL(/threads/);
	thread = new URL(page.url()).pathname;

	// By key, which always counts: the page drops a press by pointer in the blink after rows have moved, so that
	// nobody takes what has just slid under the finger.
	await rowOf(therapist.page)
		.getByRole('button', { name: /Accept/ })
		.press('Enter');
	await expect(rowOf(therapist.page)).toHaveCount(0);
	await expect(page.getByText('Accepted.', { exact: true })).toBeVisible();

	await openThread(nurse.page);
	await openThread(therapist.page);
	await therapist.page.getByPlaceholder(/Write into the thread/).fill('Seen at 11, sitting out twice.');
	await therapist.page.getByRole('button', { name: 'Send' }).click();
	for (const reader of [surgeon, nurse, therapist]) {
		await expect(reader.page.getByText('Seen at 11, sitting out twice.')).toBeVisible();
	}
});

test('clear: the therapist asks for the arm stage, the surgeon clears it to 90 degrees', async () => {
	const asking = therapist.page;
	await goTo(surgeon.page, 'Loose ends');
	await asking.getByText('Ask for a clearance').click();
	await asking.getByLabel(/For what/).selectOption('arm-stage');
	await asking.getByLabel(/What do you ask/).fill('Wound dry, breastbone stable. May it start?');
	await asking.getByRole('button', { name: 'Ask', exact: true }).click();

	const row = rowOf(surgeon.page);
	await expect(row).toContainText('Arm stage');
	await row.getByRole('link', { name: /Answer/ }).press('Enter');
	await expect(surgeon.page.getByText('May the arm stage start?')).toBeVisible();
	await expect(surgeon.page.getByText('born 12 Mar 1951').first()).toBeVisible();
	await surgeon.page.getByRole('radio', { name: '90°' }).check();
	await surgeon.page.getByRole('button', { name: 'Clear, to 90 degrees' }).click();

	await expect(asking.getByText(/Cleared with limits.*90 degrees/).first()).toBeVisible();
	await expect(nurse.page.getByText(/Cleared with limits.*90 degrees/).first()).toBeVisible();
});

test('notice: the findings show while the therapist types', async () => {
	const { page } = therapist;
	await page.getByRole('link', { name: 'Record a session' }).click();
	await page.getByRole('radio', { name: 'awake, follows commands' }).check();
	await reading(page, 'Systolic').fill('128');
	await reading(page, 'Diastolic').fill('74');
	await reading(page, 'Pulse').fill('76');
	await page.getByRole('tab', { name: /After/ }).click();
	await reading(page, 'Systolic').fill('108');
	await expect(page.getByText('Stop. Sit the patient down.').first()).toBeVisible();
	await expect(page.getByText(/fell by 20|fall of 20|by 20 mmHg/i).first()).toBeVisible();
	await reading(page, 'Diastolic').fill('66');
	await reading(page, 'Pulse').fill('89');
	await page.getByRole('button', { name: 'Record the session' }).click();
	await expect(page.getByText('Recorded').first()).toBeVisible();
	await expect(nurse.page.getByText(/128\/74/).first()).toBeVisible();
});

test('escalate: the SMS brings the nurse a link; a look takes nothing; she takes it, goes and settles it', async ({
	browser
}) => {
	const raising = therapist.page;
	await raising.getByRole('link', { name: 'Escalate' }).first().click();
	await expect(raising.getByText(/Collapsed, or getting worse fast/)).toBeVisible();
	await expect(raising.getByLabel(/Situation|Assessment/).first()).toHaveValue(/128|108/);
	await raising.getByRole('radio', { name: /High/ }).check();
	await raising.getByRole('button', { name: 'Raise it' }).click();
	await expect(raising).toHaveURL(/escalations/);

	const text = await textArrives(product.smsUrl, /Rona Ferris/, /T21/);
	expect(text.body).toContain('Tern Ward');
	expect(text.body).not.toMatch(/Penhale|Orla|128|108|pressure|bypass/i);
	const link = /https?:\S+\/t\/\S+/.exec(text.body)?.[0] ?? '';

	// A preview, a scanner, a curious look: by GET and HEAD, with and without a sign-in.
	const cookie = (await nurse.context.cookies()).map(({ name, value }) => `${name}=${value}`).join('; ');
	for (const headers of [undefined, { cookie }]) {
		for (const method of ['GET', 'HEAD']) {
			expect((await fetch(link, { method, ...(headers && { headers }) })).status).toBe(200);
		}
	}
	await expect(raising.getByText(/nobody has it/i).first()).toBeVisible();
	// The surgeon has the thread open on a phone, and hears of it as everybody of the unit does.
	await openThread(surgeon.page);
	const strip = surgeon.page.getByRole('region', { name: 'Untaken escalations' });
	await expect(strip.getByText(/nobody has it/)).toBeVisible();

	// Two minutes later, still untaken: the nurses are told again, from a timer in the database.
	await product.advance(120_000);
	await textArrives(product.smsUrl, /Rona Ferris/, /T21/, 2);

	const phone = await seat(browser, product.url, null, PHONE);
	await phone.page.goto(link);
	await expect(phone.page.getByText('Tern Ward')).toBeVisible();
	await expect(phone.page.getByText(PATIENT)).toHaveCount(0);
	await phone.page.getByRole('button', { name: 'I take it' }).click();
	await expect(phone.page.getByText('You have it').first()).toBeVisible();
	await expect(raising.getByText(/Rona Ferris has it/).first()).toBeVisible();
	await expect(strip.getByText(/nobody has it/)).toHaveCount(0);
	await expect(surgeon.page.getByText('Taken.', { exact: true })).toBeVisible();
	await phone.context.close();

	await goTo(nurse.page, 'Loose ends');
	// Two taps from the list: there, and on to what is to be written. By key: see the first step.
	await rowOf(nurse.page)
		.getByRole('button', { name: /I am there/ })
		.press('Enter');
	await expect(raising.getByText(/At the bedside since/).first()).toBeVisible();
	await rowOf(nurse.page).getByRole('link', { name: /Go on/ }).press('Enter');
	await nurse.page.getByRole('button', { name: 'Settle' }).first().click();
	const sheet = nurse.page.getByRole('dialog');
	await sheet.getByRole('radio', { name: 'Settled with rest' }).check();
	await sheet.getByLabel(/^Note/).fill('122/70 after five minutes, feels well.');
	await sheet.getByLabel(/Which physician knows/).fill('Marta Lisowska');
	await sheet.getByRole('radio', { name: '15 min' }).check();
	await sheet.getByRole('button', { name: 'Settle' }).click();
	await expect(raising.getByText('Escalation settled').first()).toBeVisible();
	await expect(surgeon.page.getByText(/Escalation settled: Settled with rest/)).toBeVisible();
	await goTo(nurse.page, 'Loose ends');
	await expect(rowOf(nurse.page)).toContainText('Measure again');
});

test('the stream is cut and resumes without a gap', async () => {
	for (const each of [surgeon, therapist]) {
		await openThread(each.page);
		await expectConnected(each.page);
	}
	await product.kill();
	await expect(surgeon.page.getByText(/Not connected/).first()).toBeVisible();
	await product.restart();
	const nurseApi = await signInAs(product.url, 'nurse');
	const threadId = thread.split('/').at(-1) ?? '';
	for (const n of [1, 2, 3]) {
		await nurseApi.post(`/api/threads/${threadId}/entries`, { body: `After the restart ${n}` });
	}
	for (const each of [surgeon, therapist]) {
		for (const n of [1, 2, 3]) {
			await expect(each.page.getByText(`After the restart ${n}`)).toBeVisible({ timeout: 20_000 });
		}
		await expectConnected(each.page);
	}
});

test('remind: the coordinator books, the text goes out when due, YES confirms, the referrer gets a mail', async () => {
	test.setTimeout(120_000);
	const { page } = coordinator;
	await openVisits(page);
	await page.getByRole('button', { name: /Book/ }).first().click();
	const day = addDays(localDateOf(Date.now(), ZONE), 4);
	await page.getByLabel(/^Day|^Date/).fill(day);
	await page.getByLabel(/^Time/).fill('10:00');
	await page.getByLabel(/^Minutes/).fill('45');
	await page.getByRole('combobox', { name: /^Place/ }).selectOption({ label: 'East Gym' });
	await page.getByRole('button', { name: /Book/ }).last().click();
	await expect(page.getByText(/planned/).first()).toBeVisible();

	const mail = await mailArrives(product.mailUrl, 'surgeon@saltmarsh.example');
	expect(`${mail.subject} ${mail.text}`).not.toMatch(/Penhale|bypass|surgery/i);
	expect(mail.text).toContain(product.url);

	// Up to here no browser complained; what comes now ends their sign-ins, and they say so.
	expect([surgeon, therapist, nurse, coordinator].flatMap((each) => each.complaints)).toEqual([]);
	// Two days before the visit at 17:00 the text is due. Every sign-in has ended by then, as a shift does.
	await product.advanceTo(instantOf(addDays(day, -2), '17:01', ZONE));
	const text = await textArrives(product.smsUrl, new RegExp(NUMBER.replace('+', '\\+')), /YES/);
	expect(text.body).not.toMatch(/Penhale|surgery|heart|bypass/i);
	await expect(therapist.page.getByText('Your sign-in has ended')).toBeVisible({ timeout: 30_000 });
	await signIn(page, 'coordinator');
	await openVisits(page);
	await expectConnected(page);
	await reply(product.smsUrl, NUMBER, 'Yes!');
	await expect(page.getByText(/confirmed/).first()).toBeVisible();
});
