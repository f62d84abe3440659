/** What becomes of messages when the server is killed in the middle of sending them. */
import { setTimeout as pause } from 'node:timers/promises';
import { eq, inArray } from 'drizzle-orm';
import { db } from '$lib/server/db';
import { outbox, outboxAttempts } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import type { Client } from '../support/api';
import { itemsOf, sendJson, type Phone } from '../support/fakes';
import { inFile, writeTexts, type Sending } from '../support/outbox-file';
import type { Product } from '../support/server';

const HOUR = 60 * 60_000;
/** So many that wait after an unknown end are left to their schedule. */
const REST = 10;
/** In one round of so many the gateway takes messages and gives no answer. */
const SILENT_ROUND = 3;
/** Far more than it takes; a run that makes no way must end. */
const MOST_ROUNDS = 1_000;

/**
 * Write many messages while the server is stopped, then kill it again and again until all of them have left.
 * @returns what is wrong, and how many arrived more than once
 */
export async function sendThroughKills(
	product: Product,
	admin: Client,
	count: number,
	random: () => number
): Promise<{ wrong: string[]; kills: number; twice: number }> {
	const run = newId();
	const sendings = await inFile(product, () => writeTexts(count, run));
	await product.restart();
	let kills = 0;
	while ((await waiting(admin, run)) > REST && kills < MOST_ROUNDS) {
		if (kills % SILENT_ROUND === 0) {
			const fault = { mode: 'accept-then-drop', count: 1 + Math.floor(random() * 3) };
			await sendJson('PUT', `${product.smsUrl}/faults`, fault);
		}
		await pause(random() * 1_000);
		await product.kill('SIGKILL');
		kills += 1;
		await product.restart();
	}
	// What waits after an unknown end has its time, and is sent at the jump.
	await product.advance(HOUR);
	return { kills, ...(await inFile(product, async () => judge(sendings, await copies(product)))) };
}

/** How many are still to leave, as the message log has it. */
async function waiting(admin: Client, run: string): Promise<number> {
	const lists = await Promise.all(
		['ready', 'sending'].map((state) => admin.get(`/api/messages?limit=200&q=${run}&state=${state}`))
	);
	return lists.reduce((sum, { body }) => sum + (body.items as unknown as unknown[]).length, 0);
}

/** How often each text stands on a telephone. */
async function copies({ smsUrl }: Product): Promise<Map<string, number>> {
	const counts = new Map<string, number>();
	for (const { messages } of await itemsOf<Phone>(`${smsUrl}/phones`)) {
		for (const { direction, body } of messages) {
			counts.set(body, (counts.get(body) ?? 0) + (direction === 'out' ? 1 : 0));
		}
	}
	return counts;
}

/** Each arrived; more than once only where an attempt ended in a way that nobody knows. */
async function judge(
	sendings: Sending[],
	arrived: Map<string, number>
): Promise<{ wrong: string[]; twice: number }> {
	const wrong: string[] = [];
	let twice = 0;
	for (const { id, body } of sendings) {
		const [row] = await db().select().from(outbox).where(eq(outbox.id, id));
		const attempts = await db()
			.select()
			.from(outboxAttempts)
			.where(inArray(outboxAttempts.messageId, [id]));
		const count = arrived.get(body) ?? 0;
		twice += count > 1 ? 1 : 0;
		if (count === 0 || (row?.state !== 'accepted' && row?.state !== 'delivered')) {
			wrong.push(`"${body}" is ${row?.state} and arrived ${count} times`);
		}
		if (count > 1 && !attempts.some(({ outcome }) => outcome === 'unknown')) {
			wrong.push(`"${body}" arrived ${count} times, and every attempt has a known end`);
		}
	}
	return { wrong, twice };
}
