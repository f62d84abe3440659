import type { Browser, Locator, Page } from '@playwright/test';
import { admit, signInAs, type Client } from '../../support/api';
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
	#therapist: Keyboard | null = null;

	private constructor(
		readonly browser: Browser,
		readonly product: Product,
		readonly episodeId: string
	) {}

	/** The therapist has begun: two patients of theirs, about one of whom the surgeon has put a question. */
	static async begin(browser: Browser): Promise<Shift> {
		const product = await startProduct({ env: { RATE_LIMIT_SCALE: '100' } });
		const therapist = await signInAs(product.url, 'therapist');
		const surgeon = await signInAs(product.url, 'surgeon');
		const mine = await referred(surgeon, BED, PATIENT);
		await referred(surgeon, OTHER_BED, 'Enda Roche');
		await therapist.post(`/api/referrals/${mine.id}/accept`);
		const { user } = (await therapist.get('/api/me')).body as unknown as { user: { id: string } };
		const question = { body: 'Who goes to her today?', mentions: [user.id] };
		await surgeon.post(`/api/threads/${mine.threadId}/entries`, question);
		const shift = new Shift(browser, product, mine.episodeId);
		shift.#therapist = await shift.at('therapist');
		return shift;
	}

	async end(): Promise<void> {
		await Promise.all(this.#seats.map(({ context }) => context.close()));
		await this.product.stop();
	}

	/** Whose page stays open while the others answer. */
	get therapist(): Keyboard {
		if (!this.#therapist) {
			throw new Error('The therapist has not begun.');
		}
		return this.#therapist;
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
		return keyboard;
	}
}

/** A patient in that bed, for whom the surgeon asks for physiotherapy. */
async function referred(surgeon: Client, bed: string, name: string) {
	const patient = { name, birthDate: '1951-03-12', sex: 'female', mrn: `SG-${bed}` };
	const episodeId = await admit(await signInAs(surgeon.url, 'coordinator'), { patient, bed });
	const { body } = await surgeon.post(`/api/episodes/${episodeId}/referrals`, {
		service: 'physiotherapy',
		priority: 'soon',
		question: 'Begin to mobilise, slow at first.'
	});
	return { episodeId, id: String(body.id), threadId: String(body.threadId) };
}

/** What waits on the person whose home page is open. */
export const rowsOf = (page: Page): Locator =>
	page.getByRole('region', { name: 'Waiting on you' }).getByRole('listitem');
