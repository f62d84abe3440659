import type { Browser, Page } from '@playwright/test';
import type { SIGN_INS } from '../support/api';
import { admit, signInAs, type Client } from '../support/api';
import type { Product } from '../support/server';
import { mailArrives } from './fakes';
import { PHONE } from './people';

type Who = keyof typeof SIGN_INS;

/** A product as its people have it with script off, and what their forms are about. */
export class Scriptless {
	readonly #clients: Partial<Record<Who, Client>> = {};

	constructor(readonly product: Product) {}

	/** Their program, which sees what the server has. */
	async as(who: Who): Promise<Client> {
		return (this.#clients[who] ??= await signInAs(this.product.url, who));
	}

	/** A phone without script, of somebody who is signed in, or of nobody. */
	async phoneOf(browser: Browser, who: Who | null): Promise<Page> {
		const context = await browser.newContext({
			baseURL: this.product.url,
			viewport: PHONE,
			javaScriptEnabled: false
		});
		if (who) {
			const [name = '', value = ''] = ((await this.as(who)).cookie ?? '').split('=');
			await context.addCookies([{ name, value, url: this.product.url }]);
		}
		return context.newPage();
	}

	/** A patient of the test's own, referred to physiotherapy. */
	async referred(): Promise<Record<'episodeId' | 'threadId' | 'referralId' | 'thread', string>> {
		const episodeId = await admit(await this.as('coordinator'), { level: 5 });
		const referral = { service: 'physiotherapy', priority: 'soon', question: 'Begin to mobilise.' };
		const { body } = await (await this.as('surgeon')).post(`/api/episodes/${episodeId}/referrals`, referral);
		const threadId = String(body.threadId);
		return {
			episodeId,
			threadId,
			referralId: String(body.id),
			thread: `/patients/${episodeId}/threads/${threadId}`
		};
	}

	/** A clearance that this kind of activity may start is asked for. */
	async asked(episodeId: string, kind: string): Promise<{ page: string; path: string }> {
		const ask = { kind, question: 'It went well, and nothing speaks against it.' };
		const { body } = await (await this.as('therapist')).post(`/api/episodes/${episodeId}/clearances`, ask);
		return { page: `/patients/${episodeId}/clearances/${body.id}`, path: `/api/clearances/${body.id}` };
	}

	/** A high call about a patient in this bed. */
	async called(bed: string): Promise<string> {
		const episodeId = await admit(await this.as('coordinator'), { bed });
		const call = {
			grade: 'high',
			situation: 'Pulse is fast.',
			background: 'Bypass.',
			assessment: 'Too fast.',
			request: 'Please come.'
		};
		const { body } = await (await this.as('therapist')).post(`/api/episodes/${episodeId}/escalations`, call);
		return String(body.id);
	}

	/** Two visits of a patient who gets mails, and the address of their own page. */
	async ownPage(): Promise<{ link: string; states: () => Promise<string[]> }> {
		const coordinator = await this.as('coordinator');
		const patient = {
			name: 'Ida Orla',
			birthDate: '1950-01-31',
			sex: 'female',
			mrn: 'T-88200',
			email: 'ida.orla@patients.example',
			mailConsent: true
		};
		const episodeId = await admit(coordinator, { patient });
		for (const days of [8, 10]) {
			const startsAt = new Date(Date.now() + days * 86_400_000).toISOString();
			await coordinator.post(`/api/episodes/${episodeId}/visits`, {
				startsAt,
				minutes: 45,
				place: 'East Gym'
			});
		}
		await coordinator.post(`/api/episodes/${episodeId}/patient-page`, { way: 'mail' });
		// The mails about the two visits come in their own time, before it or after it.
		const LINK = /\/p\/[\w-]{22}/;
		const { text } = await mailArrives(this.product.mailUrl, patient.email, LINK);
		return {
			link: LINK.exec(text)?.[0] ?? '',
			async states() {
				const { visits } = (await coordinator.get(`/api/episodes/${episodeId}`)).body;
				return (visits as unknown as { state: string }[]).map(({ state }) => state);
			}
		};
	}
}
