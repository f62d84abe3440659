import path from 'node:path';
import { closeDatabase, db, openDatabase } from '$lib/server/db';
import { outbox } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import type { Product } from './server';

const DAY = 24 * 60 * 60_000;
/** Rows of one statement: the database takes so many values at once. */
const BATCH = 100;

/** Each has a number and words of its own, so that the gateway can say how often it arrived. */
export interface Sending {
	id: string;
	number: string;
	body: string;
}

/** Do something with a product's database while nobody else has it: its server is killed, and stays so. */
export async function inFile<T>(product: Product, work: () => Promise<T>): Promise<T> {
	await product.kill('SIGKILL');
	await openDatabase(`file:${path.join(product.dataDir, 'ropewalk.db')}`);
	try {
		return await work();
	} finally {
		closeDatabase();
	}
}

/** Write many texts that are due, to numbers of nobody; inside {@link inFile}. `run` stands in each of them. */
export async function writeTexts(count: number, run: string): Promise<Sending[]> {
	const sendings = Array.from({ length: count }, (_, n) => ({
		id: newId(),
		number: `+35389${String(n).padStart(7, '0')}`,
		body: `Message ${n} of run ${run}.`
	}));
	const [now, expiresAt] = [Date.now(), Date.now() + DAY];
	for (let at = 0; at < count; at += BATCH) {
		const rows = sendings.slice(at, at + BATCH).map(({ id, number, body }) => ({
			...{ id, body, address: number, causeKey: `many:${id}` },
			...{ kind: 'answer' as const, channel: 'sms' as const, refKind: 'inbound' as const, refId: id },
			...{ state: 'ready' as const, createdAt: now, nextAt: now, expiresAt }
		}));
		await db().insert(outbox).values(rows);
	}
	return sendings;
}
