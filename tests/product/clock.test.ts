import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { admit, signInAs, type Client } from '../support/api';
import { startProduct, type Product } from '../support/server';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

let product: Product;
let surgeon: Client;
let therapist: Client;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	surgeon = await signInAs(product.url, 'surgeon');
	therapist = await signInAs(product.url, 'therapist');
});
afterAll(() => product?.stop());

interface Phone {
	number: string;
	messages: { sid: string; body: string; direction: 'in' | 'out' }[];
}

/** Everything that was sent by text message and holds this, as it is at the moment of asking. */
async function texts(part: string): Promise<string[]> {
	const { items } = (await (await fetch(`${product.smsUrl}/phones`)).json()) as { items: Phone[] };
	const out = items.flatMap(({ messages }) => messages.filter(({ direction }) => direction === 'out'));
	return out.map(({ body }) => body).filter((body) => body.includes(part));
}

interface Step {
	step: number;
	at: string;
}

async function raise(client: Client, episodeId: string): Promise<string> {
	const { body, status } = await client.post(`/api/episodes/${episodeId}/escalations`, {
		grade: 'high',
		situation: 'Pressure fell by 20.',
		background: 'Bypass.',
		assessment: 'Too much.',
		request: 'Please come.'
	});
	expect(status).toBe(201);
	return String(body.id);
}

async function escalation(client: Client, id: string): Promise<{ steps: Step[]; state: string }> {
	const { body } = await client.get(`/api/escalations/${id}`);
	return body as unknown as { steps: Step[]; state: string };
}

describe('moving the clock', () => {
	it('has sent every chain step due by then when it answers', async () => {
		const bed = 'CLK-CHAIN';
		const id = await raise(therapist, await admit(surgeon, { bed }));
		await product.advance(0);
		const first = (await texts(bed)).length;
		expect(first).toBeGreaterThan(0);
		const steps = (await escalation(surgeon, id)).steps.length;
		await product.advance(10 * MINUTE);
		expect((await escalation(surgeon, id)).steps.length).toBeGreaterThan(steps);
		expect((await texts(bed)).length).toBeGreaterThan(first);
	});

	it('keeps a call and its message over a kill before the message has left, and goes on with its chain', async () => {
		const bed = 'CLK-KILL';
		const episodeId = await admit(surgeon, { bed });
		await fetch(`${product.smsUrl}/faults`, {
			method: 'PUT',
			headers: { 'content-type': 'application/json' },
			body: JSON.stringify({ mode: 'refuse' })
		});
		const before = Date.parse(await serverNow());
		const id = await raise(therapist, episodeId);
		await product.kill('SIGKILL');
		expect(await texts(bed)).toEqual([]);
		await fetch(`${product.smsUrl}/faults`, {
			method: 'PUT',
			headers: { 'content-type': 'application/json' },
			body: JSON.stringify({ mode: 'ok' })
		});
		await product.restart();
		// A clock that was moved does not go back: all that is due would wait for it to come round again.
		expect(Date.parse(await serverNow())).toBeGreaterThanOrEqual(before);
		// An attempt that was refused waits for its next one, one that was cut short for the end of its lease.
		for (let n = 0; n < 6 && (await texts(bed)).length < 2; n += 1) {
			await product.advance(MINUTE / 4);
		}
		// The nurse and the nurse in charge, each with a link of their own, and nobody twice; where the kill came late,
		// whoever is next as well, because neither of them could be reached.
		const first = (await texts(bed)).length;
		expect(first).toBeGreaterThanOrEqual(2);
		expect(new Set(await texts(bed)).size).toBe(first);
		const steps = (await escalation(surgeon, id)).steps.length;
		await product.advance(10 * MINUTE);
		expect((await escalation(surgeon, id)).steps.length).toBeGreaterThan(steps);
		expect((await texts(bed)).length).toBeGreaterThan(first);
	});

	it('has ended every sign-in of before, and its stream, after a shift', async () => {
		const nurse = await signInAs(product.url, 'nurse');
		const live = await fetch(`${product.url}/api/live`, { headers: { cookie: nurse.cookie ?? '' } });
		const reader = live.body?.getReader();
		await product.advance(12 * HOUR - MINUTE);
		expect((await nurse.get('/api/me')).status).toBe(200);
		await product.advance(MINUTE);
		expect((await nurse.get('/api/me')).status).toBe(401);
		let done = false;
		while (!done) {
			({ done } = (await reader?.read()) ?? { done: true });
		}
		expect(done).toBe(true);
	});

	it('has let every clearance lapse whose last day is past, and its thread says so', async () => {
		const [decider, asker] = [
			await signInAs(product.url, 'surgeon'),
			await signInAs(product.url, 'therapist')
		];
		const episodeId = await admit(decider);
		const { body: referral } = await decider.post(`/api/episodes/${episodeId}/referrals`, {
			service: 'physiotherapy',
			priority: 'soon',
			question: 'Begin to mobilise.'
		});
		const threadId = String(referral.threadId);
		const asked = await asker.post(`/api/episodes/${episodeId}/clearances`, {
			kind: 'arm-stage',
			question: 'Wound dry. May it start?',
			threadId
		});
		const reviewOn = new Date(Date.parse(await serverNow()) + 24 * HOUR).toISOString().slice(0, 10);
		const given = await decider.post(`/api/clearances/${asked.body.id}/give`, { reviewOn });
		expect(given.status).toBe(200);
		await product.advance(50 * HOUR);
		const reader = await signInAs(product.url, 'surgeon');
		expect((await reader.get(`/api/clearances/${asked.body.id}`)).body.state).toBe('lapsed');
		const { items } = (await reader.get(`/api/threads/${threadId}`)).body;
		expect(items.at(-1)).toMatchObject({ kind: 'event', ref: { kind: 'clearance', id: asked.body.id } });
		expect(items.at(-1)?.at).not.toBe(items.at(-2)?.at);
	});

	it('has sent every reminder due by then when it answers', async () => {
		const coordinator = await signInAs(product.url, 'coordinator');
		const phone = '+353861230099';
		const number = { phone, smsConsent: true, language: 'en' };
		const episodeId = await admit(coordinator, {
			patient: { name: 'Remi Tide', birthDate: '1950-01-31', sex: 'male', mrn: 'CLK 1', ...number }
		});
		const now = Date.parse(await serverNow());
		const startsAt = new Date(Math.ceil((now + 5 * 24 * HOUR) / (24 * HOUR)) * 24 * HOUR + 12 * HOUR);
		const visit = await coordinator.post(`/api/episodes/${episodeId}/visits`, {
			startsAt: startsAt.toISOString(),
			minutes: 45,
			place: 'East Gym'
		});
		expect(visit.status).toBe(201);
		await product.advance(startsAt.getTime() - now - HOUR);
		expect((await sentTo(phone)).some((body) => body.includes('East Gym'))).toBe(true);
	});
});

async function sentTo(phone: string): Promise<string[]> {
	const { items } = (await (await fetch(`${product.smsUrl}/phones`)).json()) as { items: Phone[] };
	const mine = items.filter(({ number }) => number === phone);
	return mine.flatMap(({ messages }) => messages.map(({ body }) => body));
}

/** What the server takes for now, as moving its clock by nothing answers. */
async function serverNow(): Promise<string> {
	const response = await fetch(`${product.url}/api/demo/clock`, {
		method: 'PUT',
		headers: { 'content-type': 'application/json' },
		body: JSON.stringify({ advanceMs: 0 })
	});
	return ((await response.json()) as { now: string }).now;
}
