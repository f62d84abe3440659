import { expect } from '@playwright/test';
import { signInAs, type Client } from '../support/api';
import type { Product } from '../support/server';
import { AT } from './camera';

/** Where the kept pictures are taken: addresses in the demonstration hospital, with a little more going on in it. */
export interface Scene {
	/** The patient of the arm stage, with an open ask in the thread. */
	patient: string;
	thread: string;
	/** The arm stage as the surgeon answers it. */
	ask: string;
	bedside: string;
	/** The patient's own page, and a call for help on a phone. */
	own: string;
	call: string;
}

interface Listed {
	items: { id: string; bed: string | null; phase: string; patient: { name: string } }[];
}

export async function setScene(product: Product): Promise<Scene> {
	const [therapist, coordinator, surgeon] = await Promise.all([
		signInAs(product.url, 'therapist'),
		signInAs(product.url, 'coordinator'),
		signInAs(product.url, 'surgeon')
	]);
	const { items } = (await therapist.get('/api/episodes?limit=100')).body as unknown as Listed;
	const inBed = (bed: string) => items.find((one) => one.bed === bed)?.id ?? '';
	const board = (await therapist.get(`/api/episodes/${inBed('T4')}`)).body as unknown as {
		threads: { id: string }[];
	};
	await made(therapist, `/api/episodes/${inBed('T2')}/clearances`, {
		kind: 'oral-intake',
		question: 'Voice is back and the cough is strong. May she drink?'
	});
	await made(therapist, `/api/episodes/${inBed('T7')}/clearances`, {
		kind: 'discharge',
		question: 'A flight of stairs went well twice. May she go home on Saturday?'
	});
	const { mine } = (await surgeon.get('/api/loose-ends')).body as unknown as {
		mine: { kind: string; id: string; bed: string | null }[];
	};
	const ask = mine.find(({ kind, bed }) => kind === 'clearance' && bed === 'T4');
	return {
		patient: `/patients/${inBed('T4')}`,
		thread: `/patients/${inBed('T4')}/threads/${board.threads[0]?.id}`,
		ask: `/patients/${inBed('T4')}/clearances/${ask?.id}`,
		bedside: `/bedside/${inBed('T4')}`,
		own: await ownPage(product, coordinator, items),
		call: await call(product, therapist, inBed('T5'))
	};
}

async function made(client: Client, path: string, body: unknown): Promise<string> {
	const answer = await client.post(path, body);
	if (answer.status >= 300) {
		throw new Error(`${path}: ${answer.status} ${answer.text}`);
	}
	return String(answer.body.id);
}

/** A text with the link goes to somebody who comes to the gym. */
async function ownPage(product: Product, coordinator: Client, patients: Listed['items']): Promise<string> {
	for (const { id } of patients.filter(({ phase }) => phase === 'outpatient')) {
		if ((await coordinator.post(`/api/episodes/${id}/patient-page`, { way: 'sms' })).status < 300) {
			return link(`${product.smsUrl}/phones`, /\/p\/[\w-]{16,}/g);
		}
	}
	throw new Error('Nobody has a page of their own.');
}

/** A call that nobody has taken for a minute and three quarters. */
async function call(product: Product, therapist: Client, episodeId: string): Promise<string> {
	await made(therapist, `/api/episodes/${episodeId}/escalations`, {
		grade: 'high',
		situation: 'Systolic pressure fell from 128 to 108 after walking.',
		background: 'Bypass, day 6.',
		assessment: 'Light-headed, sitting now.',
		request: 'Please come.'
	});
	const found = await link(`${product.smsUrl}/phones`, /\/t\/[\w-]{16,}/g);
	await product.advanceTo(Date.parse(AT) + 106_000);
	return found;
}

/** The newest link of that form that a stand-in has received. */
async function link(url: string, form: RegExp): Promise<string> {
	let newest = '';
	const look = async () => (newest = (await (await fetch(url)).text()).match(form)?.at(-1) ?? '');
	await expect.poll(look).not.toBe('');
	return newest;
}
