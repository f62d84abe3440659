import { expect, type Browser, type Locator, type Page } from '@playwright/test';
import { addDays, localDateOf, weekdayOf, type LocalDate } from '../../../src/lib/domain/core/time';
import { SIGN_INS } from '../../support/api';
import { startProduct, type Product } from '../../support/server';
import { DESK, PHONE, expectConnected, seat, signIn, type Seat } from '../people';

export const PATIENT = 'Orla Penhale';
export const NUMBER = '+353865551234';
/** The patient's number as a pattern, for the phones of the stand-in. */
export const PHONE_OF_PATIENT = /\+353865551234/;
export const MAIL = 'orla@post.example';
export const ZONE = 'Europe/Dublin';
/** What no message may carry: the name, and what is the matter. */
export const SECRET = /Penhale|Orla|heart|surgery|bypass|\b(128|108)\b|pressure/i;

type Who = keyof typeof SIGN_INS;

/**
 * The hospital and its people on the days of the journey: one patient, everybody at a browser of their own, and a
 * clock that only moves forward. The scenes share it and build on each other.
 */
export class Day {
	thread = '';
	/** A Monday ten to sixteen days ahead: no reminder of a visit then is due before it is wanted. */
	readonly monday: LocalDate;
	/** How far the product's clock was moved. */
	#moved = 0;

	private constructor(
		readonly browser: Browser,
		readonly product: Product,
		readonly episodeId: string,
		readonly seats: Record<Who, Seat>
	) {
		const today = localDateOf(Date.now(), ZONE);
		const ahead = Array.from({ length: 7 }, (_, n) => addDays(today, 10 + n));
		this.monday = ahead.find((day) => weekdayOf(day) === 'mon') ?? today;
	}

	static async begin(browser: Browser): Promise<Day> {
		const product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
		const seats = {} as Record<Who, Seat>;
		for (const who of Object.keys(SIGN_INS) as Who[]) {
			const onPhone = who === 'surgeon' || who === 'nurse';
			seats[who] = await seat(browser, product.url, who, onPhone ? PHONE : DESK);
		}
		return new Day(browser, product, await admitOnPage(seats.coordinator.page), seats);
	}

	async end(): Promise<void> {
		await Promise.all(Object.values(this.seats).map(({ context }) => context.close()));
		await this.product.stop();
	}

	/** What the browsers complained of so far, with whose it was; that sign-ins end as days pass is meant. */
	get complaints(): string[] {
		return Object.entries(this.seats).flatMap(([who, { complaints }]) =>
			complaints.filter((each) => !each.includes('status of 401')).map((each) => `${who}: ${each}`)
		);
	}

	page(who: Who): Page {
		return this.seats[who].page;
	}

	/** What the product's clock shows. */
	get now(): number {
		return Date.now() + this.#moved;
	}

	get visits(): string {
		return `/patients/${this.episodeId}/visits`;
	}

	/** Let time pass until this instant. Sign-ins end meanwhile, as a shift does. */
	async until(instant: number): Promise<void> {
		await this.pass(instant - this.now);
	}

	/** Let so many milliseconds pass, and do what is due by then. */
	async pass(milliseconds: number): Promise<void> {
		await this.product.advance(milliseconds);
		this.#moved += milliseconds;
	}

	/** Somebody comes back after a shift, to that page. */
	async back(who: Who, path: string): Promise<Page> {
		const page = this.page(who);
		await signIn(page, who);
		await page.goto(path);
		await expectConnected(page);
		return page;
	}

	/** This journey's patient, from wherever one is. */
	async openPatient(page: Page): Promise<void> {
		await goTo(page, 'Ward');
		// The page before it may have a loose end of the same name.
		await expect(page).toHaveURL(/\/ward/);
		await page.getByRole('link', { name: new RegExp(PATIENT) }).click();
		await expect(page).toHaveURL(new RegExp(`/patients/${this.episodeId}$`));
	}

	async openThread(page: Page): Promise<void> {
		await this.openPatient(page);
		await page.getByRole('main').getByRole('link', { name: 'Physiotherapy' }).click();
		await expect(page).toHaveURL(/threads/);
	}
}

/** The coordinator admits the patient on the page, operated on four days ago. */
async function admitOnPage(page: Page): Promise<string> {
	await page.goto('/ward/admit');
	await expectConnected(page);
	const fields = [
		[/^Name/, PATIENT],
		[/^Hospital number/, 'SG-77001'],
		[/^Birth date/, '1951-03-12'],
		[/^Telephone/, NUMBER],
		[/^E-mail address/, MAIL],
		[/^Bed/, 'T21'],
		[/^Procedure/, 'Bypass'],
		[/^Day/, addDays(localDateOf(Date.now(), ZONE), -4)],
		[/^Time/, '10:00']
	] as const;
	await page.getByLabel(/^Unit/).selectOption({ label: 'Tern Ward' });
	await page.getByLabel(/^Sex/).selectOption('female');
	await page.getByLabel(/^Rhythm/).selectOption('sinus');
	await page.getByLabel(/^Approach/).selectOption('sternotomy');
	for (const [field, words] of fields) {
		await page.getByRole('textbox', { name: field }).fill(words);
	}
	await page.getByRole('checkbox', { name: /Consents to text/ }).check();
	await page.getByRole('checkbox', { name: /Agrees to mails/ }).check();
	await choose(page, /^Level/, '4');
	await choose(page, /^Rate-slowing/, 'Yes');
	await page.getByRole('button', { name: 'Admit' }).click();
	await expect(page).toHaveURL(/\/patients\/[\w-]+$/);
	return new URL(page.url()).pathname.split('/')[2] ?? '';
}

const choose = (page: Page, group: RegExp, name: string): Promise<void> =>
	page.getByRole('group', { name: group }).getByRole('radio', { name }).check();

/** The row of this journey's patient in a list of loose ends. */
export const rowOf = (page: Page): Locator => page.getByRole('listitem').filter({ hasText: PATIENT });

/** One row of a list, by its words. */
export const row = (page: Page, text: string | RegExp): Locator =>
	page.getByRole('listitem').filter({ hasText: text });

/**
 * Press a button of a list that may have moved this instant. By key, which always counts: the page drops a press by
 * pointer in the blink after rows have moved, so that nobody takes what has just slid under the finger.
 */
export const press = (locator: Locator): Promise<void> => locator.press('Enter');

/** One of the places of the navigation, at the top of a desk or under the thumb on a phone. */
export async function goTo(page: Page, place: 'Loose ends' | 'Ward'): Promise<void> {
	await page.getByRole('navigation', { name: 'Places' }).getByRole('link', { name: place }).click();
}

/** A day as it is typed here: `9 3 2026`. */
export const typed = (day: LocalDate): string => day.split('-').reverse().map(Number).join(' ');

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
/** A day as lists and texts show it: `Mon 9 Mar`. */
export const shown = (weekday: string, day: LocalDate): string =>
	`${weekday} ${Number(day.slice(8))} ${MONTHS[Number(day.slice(5, 7)) - 1]}`;
