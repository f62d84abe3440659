/**
 * How quick pages are while a gateway has stopped answering, and while it posts its callbacks as fast as it can; and
 * how much work a full ward is to draw.
 * `npm run bench`. Nothing else should run on the machine meanwhile.
 */
import { randomBytes } from 'node:crypto';
import { postWebhook } from '../../src/fakes/gateway/webhook';
import { TOKEN } from '../support/hook-receiver';
import { startProduct, type Product } from '../support/server';
import { figuresOf, shown, timed } from './figures';
import { drawLanes, LANES_LIMIT_MS } from './lanes';
import { stalled } from './stalled';

/** So many callbacks come in one go; the gateway waits for each answer as long as this. */
const CALLBACKS = 2_500;
const CALLBACKS_AT_ONCE = 50;
const CALLBACK_LIMIT_MS = 1_000;

let failed = 0;

function check(name: string, fits: boolean): void {
	failed += fits ? 0 : 1;
	console.log(`${fits ? 'ok  ' : 'FAIL'} ${name}`);
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
	const { words, fits } = await stalled();
	check(words, fits);
	const product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	try {
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
