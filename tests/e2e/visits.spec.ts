import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';
import { nextWithinHours } from '../../src/lib/domain/core/hours';
import {
	addDays,
	instantOf,
	localDateOf,
	MINUTE,
	weekdayOf,
	type LocalDate
} from '../../src/lib/domain/core/time';
import { REMINDER_HOURS } from '../../src/lib/domain/visits/reminders';
import { admit, signInAs, type Client } from '../support/api';
import { itemsOf } from '../support/fakes';
import { startProduct, type Product } from '../support/server';
import { mailArrives, reply, textArrives, textsTo } from './fakes';
import { DESK, expectConnected, PHONE, seat, signIn, type Seat } from './people';

/** Visits from the booking to the day: coordinator, therapist, surgeon, nurse, and the patient with a phone and a mailbox. */
const PATIENT = 'Corentin Vale';
const NUMBER = '+353865554321';
const MAIL = 'corentin@post.example';
const ZONE = 'Europe/Dublin';

let product: Product;
let desk: Client;
let coordinator: Seat;
let therapist: Seat;
let surgeon: Seat;
let nurse: Seat;
let episodeId: string;
/** A Monday two weeks ahead: far enough that no reminder is due before it is wanted. */
let monday: LocalDate;
let link: string;

test.describe.configure({ mode: 'serial' });

test.beforeAll(async ({ browser }) => {
	test.setTimeout(180_000);
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
	desk = await signInAs(product.url, 'coordinator');
	episodeId = await admit(desk, {
		patient: {
			name: PATIENT,
			birthDate: '1949-11-02',
			sex: 'male',
			mrn: 'SG-77101',
			phone: NUMBER,
			smsConsent: true,
			email: MAIL,
			mailConsent: true
		},
		bed: 'T31',
		level: 5,
		betaBlocked: false,
		rhythm: 'sinus'
	});
	const asked = await signInAs(product.url, 'surgeon');
	const referral = { service: 'physiotherapy', priority: 'soon', question: 'Three times a week, please.' };
	await asked.post(`/api/episodes/${episodeId}/referrals`, referral);
	const days = Array.from({ length: 7 }, (_, n) => addDays(localDateOf(Date.now(), ZONE), 10 + n));
	monday = days.find((day) => weekdayOf(day) === 'mon') ?? '';
	[coordinator, therapist, surgeon, nurse] = await Promise.all([
		seat(browser, product.url, 'coordinator', DESK),
		seat(browser, product.url, 'therapist', DESK),
		seat(browser, product.url, 'surgeon', DESK),
		seat(browser, product.url, 'nurse', PHONE)
	]);
});

test.afterAll(async () => {
	await Promise.all([coordinator, therapist, surgeon, nurse].map((each) => each?.context.close()));
	await product?.stop();
});

const typed = (day: LocalDate) => day.split('-').reverse().map(Number).join(' ');
const visits = () => `/patients/${episodeId}/visits`;
const row = (page: Page, text: string) => page.getByRole('listitem').filter({ hasText: text });
const named = (day: LocalDate) =>
	`${['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'][Number(day.slice(5, 7)) - 1]}`;
const shown = (weekday: string, day: LocalDate) => `${weekday} ${Number(day.slice(8))} ${named(day)}`;

const CANCELLED = 'Visit cancelled by the patient: find another time';

/** What the coordinator owes for a visit that this patient cancelled, with its day, by day. */
async function cancelledEnds(): Promise<string[]> {
	// The move of the clock has ended the sign-in.
	desk = await signInAs(product.url, 'coordinator');
	const { mine } = (await desk.get('/api/loose-ends')).body as unknown as {
		mine: { kind: string; id: string; episodeId: string; title: string }[];
	};
	const board = (await desk.get(`/api/episodes/${episodeId}`)).body as unknown as {
		visits: { id: string; startsAt: string }[];
	};
	const starts = new Map(board.visits.map(({ id, startsAt }) => [id, startsAt]));
	return mine
		.filter((end) => end.episodeId === episodeId && end.kind === 'visit-cancelled')
		.map(({ id, title }) => `${title} ${localDateOf(Date.parse(starts.get(id) ?? ''), ZONE)}`)
		.toSorted((one, other) => one.slice(-10).localeCompare(other.slice(-10)));
}

test('the coordinator closes a day, and a series that is booked steps over it', async () => {
	const { page } = coordinator;
	await page.goto('/visits/closed-days');
	await expectConnected(page);
	await page.getByLabel(/^Day/).fill(typed(addDays(monday, 2)));
	await page.getByLabel(/^What day/).fill('Harbour Day');
	await page.getByRole('button', { name: 'Close this day' }).click();
	await expect(row(page, 'Harbour Day')).toBeVisible();

	await therapist.page.goto(visits());
	await expectConnected(therapist.page);
	await page.goto(visits());
	await expectConnected(page);
	await page.getByRole('button', { name: 'Book a visit' }).click();
	const sheet = page.getByRole('dialog');
	await sheet.getByRole('radio', { name: 'A series' }).check();
	await sheet.getByLabel(/^From/).fill(typed(monday));
	await sheet.getByLabel(/^Time/).fill('10:00');
	for (const weekday of ['Mon', 'Wed', 'Fri']) {
		await sheet.getByRole('button', { name: weekday, exact: true }).click();
	}
	await sheet.getByLabel(/^Number of visits/).fill('3');
	await sheet.getByRole('combobox', { name: /^Place/ }).selectOption({ label: 'East Gym' });
	await expect(sheet.getByText(/Closed days are left out: .*Harbour Day/)).toBeVisible();
	await sheet.getByRole('button', { name: 'Book', exact: true }).click();
	await expect(page.getByText('Booked: 3.')).toBeVisible();
	// The therapist looks at the same patient and hears of it.
	for (const day of [
		shown('Mon', monday),
		shown('Fri', addDays(monday, 4)),
		shown('Mon', addDays(monday, 7))
	]) {
		await expect(row(therapist.page, day)).toBeVisible();
	}
	await expect(row(therapist.page, shown('Wed', addDays(monday, 2)))).toHaveCount(0);
});

test('the patient has them in the calendar, the surgeon a link that asks for the sign-in', async ({
	browser
}) => {
	await mailArrives(product.mailUrl, MAIL);
	const mails = await itemsOf<{
		to: string;
		subject: string;
		text: string;
		attachments: { filename: string | null }[];
	}>(`${product.mailUrl}/mails`);
	const mail = mails.find(({ to }) => to.includes(MAIL));
	expect(mail?.attachments.map(({ filename }) => filename)).toContain('visit.ics');
	expect(`${mail?.subject} ${mail?.text}`).not.toMatch(/Vale|Corentin|heart|surgery|bypass/i);

	const news = await mailArrives(product.mailUrl, 'surgeon@saltmarsh.example');
	const address = /https?:\S+/.exec(news.text)?.[0] ?? '';
	const stranger = await seat(browser, product.url, null, DESK);
	await stranger.page.goto(address);
	await expect(stranger.page).toHaveURL(/\/sign-in/);
	await stranger.context.close();
	await surgeon.page.goto(address);
	await expect(surgeon.page.getByText(PATIENT).first()).toBeVisible();
});

test('a visit moves: the patient is told at daytime, colleagues see it at once', async () => {
	const { page } = coordinator;
	const friday = addDays(monday, 4);
	await page.getByRole('button', { name: `Move: ${PATIENT}, ${shown('Fri', friday)} 10:00` }).click();
	const sheet = page.getByRole('dialog');
	await sheet.getByLabel(/^Day/).fill(typed(addDays(monday, 2)));
	await sheet.getByRole('button', { name: 'Move the visit' }).click();
	await expect(sheet.getByText(/is a closed day/)).toBeVisible();
	await sheet.getByLabel(/^Day/).fill(typed(addDays(monday, 3)));
	await sheet.getByLabel(/^Time/).fill('1430');
	await sheet.getByRole('button', { name: 'Move the visit' }).click();
	await expect(page.getByText('Moved. The patient is being told.')).toBeVisible();
	await expect(row(therapist.page, shown('Thu', addDays(monday, 3)))).toBeVisible();
	await expect(row(therapist.page, shown('Fri', friday))).toHaveCount(0);
	// Whatever the hour is now, a text waits for the daytime.
	await product.advanceTo(nextWithinHours(Date.now() + MINUTE, ZONE, REMINDER_HOURS));
	const text = await textArrives(product.smsUrl, new RegExp(NUMBER.replace('+', '\\+')), /MOVED/);
	expect(text.body).toContain(`${shown('Thu', addDays(monday, 3))} 14:30`);
	expect(text.body).not.toMatch(/Vale|Corentin/);
	await product.advance(13 * 60 * MINUTE);
});

test('the patient’s own page: a private link, no script, a yes and a no', async ({ browser }) => {
	// The move of the clock has ended the sign-ins, as a shift does.
	await signIn(coordinator.page, 'coordinator');
	await coordinator.page.goto(visits());
	await expectConnected(coordinator.page);
	await coordinator.page.getByRole('button', { name: 'Send a link by mail' }).click();
	await expect(coordinator.page.getByText(/A link was sent by mail/)).toBeVisible();
	await expect(
		coordinator.page.getByText('The message was sent; whether it arrived is not known yet.')
	).toBeVisible();
	await expect
		.poll(async () =>
			(await itemsOf<{ to: string; text: string }>(`${product.mailUrl}/mails`)).some(({ text }) =>
				/\/p\//.test(text)
			)
		)
		.toBe(true);
	const mails = await itemsOf<{ text: string }>(`${product.mailUrl}/mails`);
	link = /https?:\S+\/p\/[\w-]{22}/.exec(mails.map(({ text }) => text).join('\n'))?.[0] ?? '';

	// A preview looks, twice: nothing changes.
	for (const method of ['GET', 'HEAD']) {
		expect((await fetch(link, { method })).status).toBe(200);
	}
	const phone = await browser.newContext({ viewport: PHONE, javaScriptEnabled: false });
	const page = await phone.newPage();
	await page.goto(link);
	await expect(page.getByRole('heading', { name: 'Your visits' })).toBeVisible();
	expect(await page.content()).not.toMatch(/Vale|Corentin|T31/);
	await page
		.getByRole('button', { name: /^I will come on Monday/ })
		.first()
		.click();
	await expect(page.getByText('You have said that you will come.')).toBeVisible();
	await expect(row(coordinator.page, shown('Mon', monday))).toContainText('confirmed');

	await page.locator('summary', { hasText: 'I cannot come' }).nth(1).click();
	await page
		.getByLabel(/Why not/)
		.nth(1)
		.fill('No bus that day.');
	await page.getByRole('button', { name: /^Cancel the visit on Thursday/ }).click();
	await expect(page.getByText('Cancelled. Please do not come.')).toBeVisible();
	await expect(row(coordinator.page, shown('Thu', addDays(monday, 3)))).toContainText(
		'They write: No bus that day.'
	);
	await phone.close();

	const file = await fetch(`${link}/visits.ics`);
	expect(file.headers.get('content-type')).toContain('text/calendar');
	expect((await file.text()).match(/STATUS:CONFIRMED/g)).toHaveLength(2);
});

test('the patient’s page is clean, day and night, and an ended link says whom to call', async ({
	browser
}) => {
	for (const colorScheme of ['light', 'dark'] as const) {
		const context = await browser.newContext({ viewport: PHONE, colorScheme, reducedMotion: 'reduce' });
		const page = await context.newPage();
		await page.goto(link);
		await expect(page.getByRole('heading', { name: 'Your visits' })).toBeVisible();
		expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
		await context.close();
	}
	await coordinator.page.getByRole('button', { name: 'End the link' }).click();
	await expect(coordinator.page.getByText('No link is open.')).toBeVisible();
	const context = await browser.newContext({ viewport: PHONE });
	const page = await context.newPage();
	expect((await page.goto(link))?.status()).toBe(410);
	await expect(page.getByRole('heading', { name: 'This link has ended' })).toBeVisible();
	await expect(page.getByRole('link', { name: '+353 1 555 0100' })).toBeVisible();
	expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
	await context.close();
});

test('the day before, the phone is reminded once; a no frees the place; on the day the nurse marks who came', async () => {
	const number = new RegExp(NUMBER.replace('+', '\\+'));
	await product.advanceTo(instantOf(addDays(monday, -1), '17:01', ZONE));
	const ofMonday = async () =>
		(await textsTo(product.smsUrl, number)).filter(({ body }) =>
			body.includes(`your visit is ${shown('Mon', monday)}`)
		);
	const text = await textArrives(product.smsUrl, number, /your visit is Mon/);
	expect(text.body).toContain('Reply NO if you cannot come');
	expect(await ofMonday()).toHaveLength(1);

	await signIn(nurse.page, 'nurse');
	await product.advanceTo(instantOf(monday, '09:30', ZONE));
	await signIn(nurse.page, 'nurse');
	await nurse.page.goto(visits());
	await expectConnected(nurse.page);
	await nurse.page
		.getByRole('button', { name: new RegExp(`^Attended: ${PATIENT}, .*10:00`) })
		.first()
		.click();
	await expect(row(nurse.page, shown('Mon', monday))).toContainText('attended');

	const next = addDays(monday, 7);
	await product.advanceTo(instantOf(addDays(next, -1), '17:01', ZONE));
	await textArrives(product.smsUrl, number, new RegExp(`your visit is ${shown('Mon', next)}`));
	await reply(product.smsUrl, NUMBER, 'Sorry, no.');
	await textArrives(product.smsUrl, number, /is cancelled. We will call/);
	expect(await ofMonday()).toHaveLength(1);

	expect(await cancelledEnds()).toEqual([addDays(monday, 3), next].map((day) => `${CANCELLED} ${day}`));
	await signIn(coordinator.page, 'coordinator');
	await expect(row(coordinator.page, PATIENT).filter({ hasText: CANCELLED })).toHaveCount(2);
});
