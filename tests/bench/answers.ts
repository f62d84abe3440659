import { admit, signInAs, type Client } from '../support/api';
import { sendJson } from '../support/fakes';
import type { Product } from '../support/server';
import { line, percentile } from './figures';

const ROUNDS = 8;
const ASKED = 60;
/** Calls for help that wait at the gateway meanwhile, each told to two nurses. */
const CALLS = 6;
/** How much slower pages may be while the gateway answers nothing: a tenth. */
const SLOWER = 1.1;

/** How long pages take to be answered, with the gateway as it should be and with one that takes requests and is silent. */
export async function benchAnswers(product: Product): Promise<boolean> {
	const [nurse, therapist, coordinator] = await Promise.all([
		signInAs(product.url, 'nurse'),
		signInAs(product.url, 'therapist'),
		signInAs(product.url, 'coordinator')
	]);
	const { items } = (await nurse.get('/api/episodes?limit=20')).body;
	const pages = ['/loose-ends', '/ward', '/visits', `/patients/${String(items[0]?.id)}`];
	await answersOf(nurse, pages);
	const calm: number[] = [];
	const stalled: number[] = [];
	for (let round = 0; round < ROUNDS; round += 1) {
		// In turn, and each first as often as the other: a busy machine and a growing ward are the same for both.
		for (const mode of round % 2 === 0 ? ['ok', 'slow'] : ['slow', 'ok']) {
			await fault(product, mode);
			await callForHelp(coordinator, therapist);
			(mode === 'ok' ? calm : stalled).push(...(await answersOf(nurse, pages)));
		}
	}
	await fault(product, 'ok');
	line('pages are answered', calm);
	const ms = percentile(calm, 0.95) * SLOWER;
	return line('the same while the gateway of texts is silent', stalled, { share: 0.95, ms });
}

async function answersOf(client: Client, pages: readonly string[]): Promise<number[]> {
	const times: number[] = [];
	for (let n = 0; n < ASKED; n += 1) {
		const before = performance.now();
		const { status } = await client.get(pages[n % pages.length] ?? '/');
		times.push(performance.now() - before);
		if (status !== 200) {
			throw new Error(`${pages[n % pages.length]} answered ${status}`);
		}
	}
	return times;
}

async function fault(product: Product, mode: string): Promise<void> {
	const { status, body } = await sendJson('PUT', `${product.smsUrl}/faults`, { mode });
	if (status !== 200) {
		throw new Error(`The fault ${mode} was refused: ${JSON.stringify(body)}`);
	}
}

/** Something urgent to send for each: the workers are at the gateway while pages are asked for. */
async function callForHelp(coordinator: Client, therapist: Client): Promise<void> {
	for (let n = 0; n < CALLS; n += 1) {
		const episodeId = await admit(coordinator);
		const { status } = await therapist.post(`/api/episodes/${episodeId}/escalations`, {
			grade: 'high',
			situation: 'Systolic pressure fell from 128 to 108 after walking.',
			background: 'Bypass.',
			assessment: 'Too much.',
			request: 'Please come.'
		});
		if (status !== 201) {
			throw new Error(`A call was answered with ${status}`);
		}
	}
}
