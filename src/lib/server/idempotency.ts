import { createHash } from 'node:crypto';
import { and, eq, lt } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import type { WriteKey } from './context';
import type { Db, Reader, Tx } from './db';
import { idempotencyKeys } from './db/schema';

/** The API promises at least seven days. */
export const KEPT_MS = 8 * 24 * 60 * 60 * 1000;

const inFlight = new Set<string>();

/** Hold the key while its first request runs; a second one meanwhile is refused. */
export async function withKey<T>(actorId: string, key: WriteKey | null, work: () => Promise<T>): Promise<T> {
	if (!key) {
		return work();
	}
	const name = JSON.stringify([actorId, key.path, key.key]);
	if (inFlight.has(name)) {
		throw new Problem('in-flight');
	}
	inFlight.add(name);
	try {
		return await work();
	} finally {
		inFlight.delete(name);
	}
}

/**
 * The first answer to this key, or null.
 * @throws Problem `idempotency-mismatch` when the key came with another body
 */
export async function firstAnswer(
	db: Reader,
	actorId: string,
	key: WriteKey
): Promise<{ answer: unknown } | null> {
	const [row] = await db
		.select({ digest: idempotencyKeys.digest, answer: idempotencyKeys.answer })
		.from(idempotencyKeys)
		.where(
			and(
				eq(idempotencyKeys.actorId, actorId),
				eq(idempotencyKeys.path, key.path),
				eq(idempotencyKeys.key, key.key)
			)
		);
	if (!row) {
		return null;
	}
	if (row.digest !== key.digest) {
		throw new Problem('idempotency-mismatch');
	}
	return { answer: row.answer };
}

/** Keep the answer in the transaction that makes it true. */
export async function keepAnswer(
	tx: Tx,
	actorId: string,
	key: WriteKey,
	now: number,
	answer: unknown
): Promise<void> {
	await tx.insert(idempotencyKeys).values({ actorId, ...key, answer, at: now });
}

export async function forgetOldKeys(db: Db, now: number): Promise<void> {
	await db.delete(idempotencyKeys).where(lt(idempotencyKeys.at, now - KEPT_MS));
}

/** SHA-256 over JSON with sorted keys: the order in which a client writes its fields does not matter. */
export function digestOf(body: unknown): string {
	return createHash('sha256').update(canonical(body)).digest('hex');
}

function canonical(value: unknown): string {
	if (Array.isArray(value)) {
		return `[${value.map(canonical).join(',')}]`;
	}
	if (value !== null && typeof value === 'object') {
		const pairs = Object.entries(value)
			.filter(([, v]) => v !== undefined)
			.sort(([a], [b]) => (a < b ? -1 : 1))
			.map(([k, v]) => `${JSON.stringify(k)}:${canonical(v)}`);
		return `{${pairs.join(',')}}`;
	}
	return JSON.stringify(value) ?? 'null';
}
