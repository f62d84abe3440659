import type { Browser, Locator, Page } from '@playwright/test';
import { admit, signInAs } from '../../support/api';
import { startProduct, type Product } from '../../support/server';
import { DESK, seat, type Seat } from '../people';
import { Keyboard } from './keyboard';

export const PATIENT = 'Orla Penhale';
export const BED = 'K1';
/** Of a patient whose referral nobody has accepted yet. */
export const OTHER_BED = 'K2';

type Who = 'therapist' | 'surgeon' | 'nurse' | 'coordinator';

/** The hospital, and its people at browsers of their own, none of whom has a pointer. */
export class Shift {
	readonly #seats: Seat[] = [];
	readonly #people = new Map<Who, Keyboard>();
	/** The patient's, once they were admitted. */
	episodeId = '';

	private constructor(
		readonly browser: Browser,
		readonly product: Product
	) {}

	/** A patient whom somebody else has referred already waits; the therapist and the coordinator have come. */
	static async begin(browser: Browser): Promise<Shift> {
		const product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
		await referOther(product.url);
		const shift = new Shift(browser, product);
		await shift.at('therapist');
		await shift.at('coordinator');
		return shift;
	}

	async end(): Promise<void> {
		await Promise.all(this.#seats.map(({ context }) => context.close()));
		await this.product.stop();
	}

	/** Whose page stays open while the others answer. */
	get therapist(): Keyboard {
		return this.#seated('therapist');
	}

	get surgeon(): Keyboard {
		return this.#seated('surgeon');
	}

	get coordinator(): Keyboard {
		return this.#seated('coordinator');
	}

	#seated(who: Who): Keyboard {
		const person = this.#people.get(who);
		if (!person) {
			throw new Error(`The ${who} has not come.`);
		}
		return person;
	}

	/** What the browsers complained of. */
	get complaints(): string[] {
		return this.#seats.flatMap(({ complaints }) => complaints);
	}

	/** Somebody comes to a browser of their own and signs in. */
	async at(who: Who): Promise<Keyboard> {
		const one = await seat(this.browser, this.product.url, null, DESK);
		this.#seats.push(one);
		const keyboard = new Keyboard(one.page);
		await keyboard.signIn(who);
		this.#people.set(who, keyboard);
		return keyboard;
	}
}

/** The other patient, for whom the surgeon asked for physiotherapy before anybody came. */
async function referOther(url: string): Promise<void> {
	const patient = { name: 'Enda Roche', birthDate: '1951-03-12', sex: 'female', mrn: 'SG-K2' };
	const episodeId = await admit(await signInAs(url, 'coordinator'), { patient, bed: OTHER_BED });
	const surgeon = await signInAs(url, 'surgeon');
	await surgeon.post(`/api/episodes/${episodeId}/referrals`, {
		service: 'physiotherapy',
		priority: 'soon',
		question: 'Begin to mobilise, slow at first.'
	});
}

/** What waits on the person whose home page is open. */
export const rowsOf = (page: Page): Locator =>
	page.getByRole('region', { name: 'Waiting on you' }).getByRole('listitem');
