import { afterAll, beforeAll, expect, it } from 'vitest';
import { eq, inArray } from 'drizzle-orm';
import { postWebhook } from '../../src/fakes/gateway/webhook';
import { db } from '$lib/server/db';
import { liveEvents, outbox } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { signInAs } from '../support/api';
import { TOKEN } from '../support/hook-receiver';
import { itemsOf, sendJson, type Phone } from '../support/fakes';
import { inFile, writeTexts } from '../support/outbox-file';
import { startProduct, type Product } from '../support/server';

/** Faults F16 and F17: hundreds of callbacks at once, each more than once and in any order. How quick is `npm run bench`. */

const MESSAGES = 50;
/** The last says least of what has become of the message, and is posted among the others. */
const STATUSES = ['queued', 'sent', 'delivered', 'sending', 'delivered'];
const TIMES = 2;
const READS = ['/loose-ends', '/ward', '/visits'];

let product: Product;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
});
afterAll(() => product?.stop());

/** Another order each time that is the same in every run. */
function mixed<T>(items: readonly T[]): T[] {
	const step = 37;
	return items.map((_, n) => items[(n * step) % items.length] as T);
}

it('every callback is answered, pages go on, and each message is where its best word puts it', async () => {
	const run = newId();
	// Its own callbacks say that nothing arrived, so that only ours can say it did.
	await sendJson('PUT', `${product.smsUrl}/faults`, { mode: 'undelivered' });
	const sendings = await inFile(product, () => writeTexts(MESSAGES, run));
	await product.restart();
	const sids = async () => {
		const phones = await itemsOf<Phone>(`${product.smsUrl}/phones`);
		return phones.flatMap(({ messages }) =>
			messages
				.filter(({ body, status }) => status === 'undelivered' && body.includes(run))
				.map(({ sid }) => sid)
		);
	};
	await expect.poll(async () => (await sids()).length, { timeout: 20_000 }).toBe(MESSAGES);
	const client = await signInAs(product.url, 'nurse');
	const all = (await sids()).flatMap((MessageSid) =>
		STATUSES.flatMap((MessageStatus) => Array.from({ length: TIMES }, () => ({ MessageSid, MessageStatus })))
	);
	const [answers, pages] = await Promise.all([
		Promise.all(
			mixed(all).map((fields) => postWebhook(TOKEN, `${product.url}/api/hooks/sms-status`, fields))
		),
		Promise.all(READS.map((page) => client.get(page)))
	]);
	expect(new Set(answers.map((answer) => answer?.status))).toEqual(new Set([200]));
	expect(pages.map(({ status }) => status)).toEqual(READS.map(() => 200));
	const ids = sendings.map(({ id }) => id);
	const [states, told] = await inFile(product, async () => [
		await db().select({ state: outbox.state }).from(outbox).where(inArray(outbox.id, ids)),
		await db().$count(liveEvents, eq(liveEvents.kind, 'delivered'))
	]);
	expect(states.filter(({ state }) => state !== 'delivered')).toEqual([]);
	expect(told).toBe(MESSAGES);
});
