/**
 * How quick pages are while a gateway has stopped answering, and while it posts its callbacks as fast as it can; and
 * how much work a full ward is to draw.
 * `npm run bench`: each pair of runs stands beside each other, and the middle one of several counts. Nothing else
 * should run on the machine meanwhile.
 */
import { randomBytes } from 'node:crypto';
import { postWebhook } from '../../src/fakes/gateway/webhook';
import { db } from '$lib/server/db';
import { outbox } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { signInAs, type Client } from '../support/api';
import { sendJson } from '../support/fakes';
import { TOKEN } from '../support/hook-receiver';
import { inFile, writeTexts } from '../support/outbox-file';
import { startProduct, type Product } from '../support/server';
import { figuresOf, middleOf, shown, timed } from './figures';
import { drawLanes, LANES_LIMIT_MS } from './lanes';

const PAIRS = 3;
const ANSWERS = 200;
const AT_ONCE = 4;
const PAGES = ['/loose-ends', '/ward', '/visits'];
/** A stalled gateway may make pages slower by so much, and a machine's own unrest is no fault. */
const MOST_SLOWER = 1.1;
const UNREST_MS = 1;
/** So many callbacks come in one go; the gateway waits for each answer as long as this. */
const CALLBACKS = 2_500;
const CALLBACKS_AT_ONCE = 50;
const CALLBACK_LIMIT_MS = 1_000;
/** More than a channel sends in all runs. */
const WAITING = 300;

let failed = 0;

function check(name: string, fits: boolean): void {
	failed += fits ? 0 : 1;
	console.log(`${fits ? 'ok  ' : 'FAIL'} ${name}`);
}

async function look(client: Client, n: number): Promise<void> {
	const page = PAGES[n % PAGES.length] ?? '';
	const { status } = await client.get(page);
	if (status !== 200) {
		throw new Error(`${page} was answered ${status}.`);
	}
}

const pages = (client: Client) => timed(ANSWERS, AT_ONCE, (n) => look(client, n));

/** Pages while nothing waits, and beside a gateway that keeps every place taken and answers after our time limit. */
async function stalled(product: Product, client: Client): Promise<void> {
	const quick: number[] = [];
	const slow: number[] = [];
	for (let pair = 0; pair < PAIRS; pair += 1) {
		const calm = figuresOf(await pages(client));
		await sendJson('PUT', `${product.smsUrl}/faults`, { mode: 'slow' });
		await inFile(product, () => writeTexts(WAITING, newId()));
		await product.restart();
		await pages(client);
		const beside = figuresOf(await pages(client));
		console.log(shown(`pages, ${pair + 1}`, calm));
		console.log(shown(`pages beside a stalled gateway, ${pair + 1}`, beside));
		quick.push(calm.p95);
		slow.push(beside.p95);
		await inFile(product, () => dropWaiting());
		await product.restart();
		await pages(client);
	}
	const [before, after] = [middleOf(quick), middleOf(slow)];
	const words = `a stalled gateway: ${before.toFixed(1)} ms before, ${after.toFixed(1)} ms beside it, at 95 %`;
	check(words, after <= before * MOST_SLOWER + UNREST_MS);
}

/** Nothing of the run before is left for the next. */
async function dropWaiting(): Promise<void> {
	await db().update(outbox).set({ state: 'cancelled', leaseOwner: null, leaseUntil: null });
}

async function callbacks({ url }: Product): Promise<void> {
	const times = await timed(CALLBACKS, CALLBACKS_AT_ONCE, async (n) => {
		const MessageSid = `SM${randomBytes(16).toString('hex')}`;
		const MessageStatus = n % 2 === 0 ? 'sent' : 'delivered';
		const answer = await postWebhook(TOKEN, `${url}/api/hooks/sms-status`, { MessageSid, MessageStatus });
		if (answer?.status !== 200) {
			throw new Error(`A callback was answered ${answer?.status ?? 'not at all'}.`);
		}
	});
	const figures = figuresOf(times);
	console.log(shown('callbacks of the gateway', figures));
	check(`each callback is answered within ${CALLBACK_LIMIT_MS} ms`, figures.max < CALLBACK_LIMIT_MS);
}

async function main(): Promise<void> {
	const product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	try {
		const client = await signInAs(product.url, 'nurse');
		await pages(client);
		await stalled(product, client);
		await callbacks(product);
		const drawn = await drawLanes(product);
		check(
			`a ward of sixty is drawn within ${LANES_LIMIT_MS} ms of its data: ${drawn.toFixed(1)} ms`,
			drawn <= LANES_LIMIT_MS
		);
	} finally {
		await product.stop();
	}
	process.exitCode = failed === 0 ? 0 : 1;
}

await main();
