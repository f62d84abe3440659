import { newId } from '$lib/server/ids';
import { signInAs, type Client } from '../support/api';
import { sendJson } from '../support/fakes';
import { inFile, writeTexts } from '../support/outbox-file';
import { startProduct } from '../support/server';
import { figuresOf, shown, timed } from './figures';

const TURNS = 16;
const WARM_TURNS = 4;
const ANSWERS = 120;
const AT_ONCE = 4;
const PAGES = ['/loose-ends', '/ward', '/visits'];
/** A stalled gateway may make the slowest pages slower by so much. */
const MOST_SLOWER = 1.1;
/** More than a channel sends in the whole run. */
const WAITING = 300;

async function look(client: Client, n: number): Promise<void> {
	const page = PAGES[n % PAGES.length] ?? '';
	const { status } = await client.get(page);
	if (status !== 200) {
		throw new Error(`${page} was answered ${status}.`);
	}
}

/** How long pages took of one of the two. */
interface Side {
	client: Client;
	times: number[];
}

/** Some pages of each, now of one first and now of the other: a machine is not equally quick all the time. */
async function takeTurns(sides: readonly [Side, Side], turns: number): Promise<void> {
	for (let turn = 0; turn < turns; turn += 1) {
		for (const { client, times } of turn % 2 === 0 ? sides : sides.toReversed()) {
			times.push(...(await timed(ANSWERS, AT_ONCE, (n) => look(client, n))));
		}
	}
}

/**
 * Pages of two products beside each other, of which one has a gateway that answers after our time limit, with every
 * place at it taken and more messages waiting.
 * @returns the verdict in words, and whether it holds
 */
export async function stalled(): Promise<{ words: string; fits: boolean }> {
	const env = { RATE_LIMIT_SCALE: '1000' };
	const [calm, beside] = await Promise.all([startProduct({ env }), startProduct({ env })]);
	try {
		await sendJson('PUT', `${beside.smsUrl}/faults`, { mode: 'slow' });
		await inFile(beside, () => writeTexts(WAITING, newId()));
		await beside.restart();
		const sideOf = async ({ url }: { url: string }) => ({ client: await signInAs(url, 'nurse'), times: [] });
		const sides: [Side, Side] = [await sideOf(calm), await sideOf(beside)];
		await takeTurns(sides, WARM_TURNS);
		sides.forEach((side) => (side.times = []));
		await takeTurns(sides, TURNS);
		const [before, after] = [figuresOf(sides[0].times), figuresOf(sides[1].times)];
		console.log(shown('pages', before));
		console.log(shown('pages beside a stalled gateway', after));
		const words = `a stalled gateway: ${before.p95.toFixed(1)} ms before, ${after.p95.toFixed(1)} ms beside it, at 95 %`;
		return { words, fits: after.p95 <= before.p95 * MOST_SLOWER };
	} finally {
		await Promise.all([calm.stop(), beside.stop()]);
	}
}
