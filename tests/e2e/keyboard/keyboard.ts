import { expect, type Locator, type Page } from '@playwright/test';
import { PASSWORD, SIGN_INS } from '../../support/api';
import { lostNow } from '../focus';
import { expectConnected } from '../people';

/** A person has lost the thread before they have pressed a key so often; past it a page needs a shorter way. */
const MOST = 25;

/** Somebody who has a keyboard and nothing else. Every stop of the focus on the way is looked at. */
export class Keyboard {
	constructor(readonly page: Page) {}

	private async stop(key: string): Promise<void> {
		await this.page.keyboard.press(key);
		// Polled: the page scrolls to what has the focus with its next picture.
		await this.isSomewhere();
	}

	/** What was done has left the focus on something, and in view. */
	async isSomewhere(): Promise<void> {
		await expect.poll(() => lostNow(this.page)).toEqual([]);
	}

	/** By the tabulator key to that control, or back to it; not so far that nobody would go there. */
	async reach(wanted: Locator, key: 'Tab' | 'Shift+Tab' = 'Tab'): Promise<void> {
		await expect(wanted).toBeVisible();
		for (let pressed = 0; pressed < MOST; pressed += 1) {
			await this.stop(key);
			if (await holdsFocus(wanted)) {
				return;
			}
		}
		throw new Error(`${String(wanted)} is more than ${MOST} presses away.`);
	}

	/** To that control, and press it. */
	async press(
		wanted: Locator,
		key: 'Enter' | 'Space' = 'Enter',
		way: 'Tab' | 'Shift+Tab' = 'Tab'
	): Promise<void> {
		await this.reach(wanted, way);
		await this.page.keyboard.press(key);
	}

	async type(field: Locator, words: string): Promise<void> {
		await this.reach(field);
		await this.page.keyboard.press('ControlOrMeta+A');
		await this.page.keyboard.type(words);
	}

	/** To a question with its answers in view, and with the arrow keys to that answer. */
	async choose(question: Locator, name: string | RegExp): Promise<void> {
		const answer = question.getByRole('radio', { name, exact: true });
		await this.reach(question);
		const answers = await question.getByRole('radio').count();
		for (let pressed = 0; pressed < answers && !(await holdsFocus(answer)); pressed += 1) {
			await this.stop('ArrowRight');
		}
		await this.page.keyboard.press('Space');
		await expect(answer).toBeChecked();
	}

	/** To a list of the browser's own, and by the first letters of an entry to it. */
	async pick(list: Locator, letters: string): Promise<void> {
		await this.reach(list);
		await this.page.keyboard.type(letters);
		await expect(list.locator('option:checked')).toHaveText(new RegExp(`^${letters}`));
	}

	/** By the bar of places, which is before what was read so far. */
	async goTo(place: string, address: RegExp): Promise<void> {
		const places = this.page.getByRole('navigation', { name: 'Places' });
		await this.press(places.getByRole('link', { name: new RegExp(`^${place}`) }), 'Enter', 'Shift+Tab');
		await this.arrive(address);
	}

	/** From a row of a list to that control of another by arrow keys. */
	async goDown(wanted: Locator): Promise<void> {
		await expect(wanted).toBeVisible();
		await this.stop('Home');
		for (let pressed = 0; pressed < MOST && !(await holdsFocus(wanted)); pressed += 1) {
			await this.stop('ArrowDown');
		}
		await expect(wanted).toBeFocused();
	}

	/** A page that has just come begins at its top: past the frame with the first link of all. */
	async arrive(address: RegExp): Promise<void> {
		await expect(this.page).toHaveURL(address);
		await expectConnected(this.page);
		await expect.poll(() => this.page.evaluate(() => document.activeElement?.localName)).toBe('body');
		await this.press(this.page.getByRole('link', { name: 'Skip to the page' }));
		await expect(this.page.getByRole('main')).toBeFocused();
	}

	async signIn(who: keyof typeof SIGN_INS): Promise<void> {
		await this.page.goto('/sign-in');
		await this.type(this.page.getByLabel(/e-mail/i), SIGN_INS[who]);
		await this.type(this.page.getByLabel(/^password/i), PASSWORD);
		await this.page.keyboard.press('Enter');
		await this.arrive(/\/loose-ends/);
	}
}

/** The focus is on it, or on a part of it. */
const holdsFocus = (wanted: Locator): Promise<boolean> =>
	wanted.evaluate((node) => node.contains(document.activeElement));
