import { expect, type Page, type Response } from '@playwright/test';
import { SIGN_IN_FIELDS } from '../../src/lib/domain/accounts/kept';
import { admit, newKey, signInAs, type Client } from '../support/api';
import { pages } from '../support/route-files';
import type { Product } from '../support/server';
import { mailArrives, reply, textArrives } from './fakes';

/** A part of another test. */
const NOT_VISITED = ['/style', '/style/form'];
/** Pages that no link leads to, and what is sent to them by the form that does. */
const POSTED: Record<string, Readonly<Record<string, string>>> = {
	'/sign-in/send': { [SIGN_IN_FIELDS.to]: '/loose-ends', body: 'Drain out at two, the wound is dry.' }
};
const PHONE_NUMBER = '+353865550177';

/** One page at an address that leads to something. */
export interface VisitedPage {
	/** As its file is called: `/patients/[id]/visits`. */
	readonly page: string;
	readonly address: string;
	readonly group: string;
	/** The fields of the form that leads to it, where no link does. */
	readonly posted?: Readonly<Record<string, string>> | undefined;
}

/** Goes to a page as a person comes to it: by its address, or in answer to a form. */
export async function open(page: Page, { address, posted }: VisitedPage): Promise<Response | null> {
	if (posted) {
		const postData = new URLSearchParams(posted).toString();
		await page.route(
			(url) => url.pathname === address,
			(route) => {
				const { origin } = new URL(route.request().url());
				const type = 'application/x-www-form-urlencoded';
				const headers = { ...route.request().headers(), origin, 'content-type': type };
				return route.continue({ method: 'POST', postData, headers });
			},
			{ times: 1 }
		);
	}
	return page.goto(address, { waitUntil: 'load' });
}

/**
 * Every page of the product, found by its file, at a real address: what it takes to have one is made here. A page that
 * nobody has given an address fails, so that none is forgotten.
 * @param now the product's instant, milliseconds UTC, where its clock stands still
 */
export async function everyPage(product: Product, now = Date.now()): Promise<VisitedPage[]> {
	// The call first: a link to it is in a text.
	const known = {
		...(await behindTheSignIn(product, now)),
		...(await linksOfStaff(product)),
		...(await patientPage(product, now))
	};
	return pages()
		.filter(({ address }) => !NOT_VISITED.includes(address))
		.flatMap(({ address, group }) => {
			const real = [address.includes('[') ? known[address] : address].flat();
			if (!real.every(Boolean)) {
				throw new Error(`No address is known for ${address}: give it one in tests/e2e/every-page.ts.`);
			}
			const posted = POSTED[address];
			return real.map((one = '', at) => ({ page: at === 0 ? address : one, address: one, group, posted }));
		});
}

/** Where the pages with blanks in their address are found; several where one page shows different things. */
type Known = Record<string, string | string[]>;

async function behindTheSignIn(product: Product, now: number): Promise<Known> {
	const [surgeon, therapist, admin] = await Promise.all([
		signInAs(product.url, 'surgeon'),
		signInAs(product.url, 'therapist'),
		signInAs(product.url, 'admin')
	]);
	const { mine } = (await surgeon.get('/api/loose-ends')).body as unknown as {
		mine: { kind: string; id: string; episodeId: string; threadId: string }[];
	};
	const asked = mine.find(({ kind }) => kind === 'clearance');
	const { body: call } = await therapist.post(`/api/episodes/${asked?.episodeId}/escalations`, {
		grade: 'high',
		situation: 'Systolic pressure fell from 128 to 108 after walking.',
		background: 'Bypass.',
		assessment: 'Too much.',
		request: 'Please come.'
	});
	const patient = `/patients/${asked?.episodeId}`;
	const below = [
		'refer',
		'move',
		'details',
		'clearances',
		'sessions',
		'level',
		'limits',
		'visits',
		'escalate'
	];
	return {
		'/patients/[id]': patient,
		...Object.fromEntries(below.map((name) => [`/patients/[id]/${name}`, `${patient}/${name}`])),
		'/patients/[id]/threads/[threadId]': `${patient}/threads/${asked?.threadId}`,
		'/patients/[id]/clearances/[clearanceId]': `${patient}/clearances/${asked?.id}`,
		'/bedside/[episodeId]': `/bedside/${asked?.episodeId}`,
		'/escalations/[id]': `/escalations/${call.id}`,
		'/admin/messages/[id]': await found(admin, '/admin/messages', /\/admin\/messages\/[\w-]{36}/),
		'/admin/accounts/[id]': await found(admin, '/admin/accounts', /\/admin\/accounts\/[\w-]{36}/),
		'/loose-ends/[what]/[id]': [await strayText(product), await untoldVisit(product, now)]
	};
}

/** The first address of that form on a page. */
async function found(client: Client, path: string, address: RegExp): Promise<string> {
	return address.exec((await client.get(path)).text)?.[0] ?? '';
}

/** A text that fits no visit and no call waits for the coordinator. */
async function strayText(product: Product): Promise<string> {
	const coordinator = await signInAs(product.url, 'coordinator');
	await reply(product.smsUrl, PHONE_NUMBER, 'Is this the hospital?');
	let address = '';
	await expect
		.poll(async () => (address = await found(coordinator, '/loose-ends', /\/loose-ends\/texts\/[\w-]+/)))
		.not.toBe('');
	return address;
}

/** A visit was cancelled of a patient whom nothing can be written to: a person has to telephone. */
async function untoldVisit(product: Product, now: number): Promise<string> {
	const coordinator = await signInAs(product.url, 'coordinator');
	const episodeId = await admit(coordinator, { ...operation(now) });
	const startsAt = new Date(now + 9 * 86_400_000).toISOString();
	const visit = { startsAt, minutes: 45, place: 'East Gym' };
	const { body } = await coordinator.post(`/api/episodes/${episodeId}/visits`, visit);
	const [booked] = body.items as unknown as { id: string }[];
	await coordinator.post(`/api/visits/${booked?.id}/cancel`, { reason: 'The gym is shut.' });
	return `/loose-ends/visits/${booked?.id}`;
}

/** Four days ago, as the product's clock has it. */
function operation(now: number) {
	const operatedAt = new Date(now - 4 * 86_400_000).toISOString();
	return { operation: { procedure: 'Bypass', approach: 'sternotomy', operatedAt } };
}

/** A patient's own page, by the link in the mail that opens it. */
async function patientPage(product: Product, now: number): Promise<Record<string, string>> {
	const coordinator = await signInAs(product.url, 'coordinator');
	const patient = {
		name: 'Ida Őry',
		birthDate: '1950-01-31',
		sex: 'female',
		mrn: 'T-88100',
		email: 'ida.ory@patients.example',
		mailConsent: true
	};
	const episodeId = await admit(coordinator, { patient, ...operation(now) });
	// By mail, because texts to patients wait for the day.
	await coordinator.post(`/api/episodes/${episodeId}/patient-page`, { way: 'mail' });
	const { text } = await mailArrives(product.mailUrl, patient.email);
	return { '/p/[token]': pathIn(text, 'p') };
}

/** The links that staff get: to a call, and to a new account. */
async function linksOfStaff(product: Product): Promise<Record<string, string>> {
	const call = await textArrives(product.smsUrl, /Rona Ferris/, /\/t\//);
	return { '/t/[token]': pathIn(call.body, 't'), '/invite/[token]': await invitation(product) };
}

async function invitation(product: Product): Promise<string> {
	const admin = await signInAs(product.url, 'admin');
	const email = 'new.admin@saltmarsh.example';
	// An administrator needs no unit.
	const fields = new URLSearchParams({ name: 'New Admin', email, role: 'admin', key: newKey() });
	await admin.send('POST', '/admin/accounts?/account', fields.toString(), {
		'content-type': 'application/x-www-form-urlencoded'
	});
	return pathIn((await mailArrives(product.mailUrl, email)).text, 'invite');
}

const pathIn = (text: string, place: string) => new RegExp(`/${place}/[\\w-]+`).exec(text)?.[0] ?? '';
