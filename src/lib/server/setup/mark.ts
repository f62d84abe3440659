import { eq } from 'drizzle-orm';
import { db, type Tx } from '../db';
import { audit, settings, users } from '../db/schema';

const KEY = 'demonstration';

/**
 * What kind of database this is. A demonstration is marked in the transaction that makes it, so that known
 * sign-ins can never appear in a hospital's own data.
 */
export type Kind =
	/** Nothing was ever done in it. */
	| 'fresh'
	/** Somebody's own. */
	| 'own'
	/** A demonstration, complete. */
	| 'demonstration'
	/** A demonstration whose making was interrupted. */
	| 'unfinished';

export async function kindOfDatabase(): Promise<Kind> {
	const [mark] = await db().select().from(settings).where(eq(settings.key, KEY));
	if (mark) {
		return mark.value === 'loaded' ? 'demonstration' : 'unfinished';
	}
	const [known, deeds] = await Promise.all([db().$count(users), db().$count(audit)]);
	return known === 0 && deeds === 0 ? 'fresh' : 'own';
}

export async function markLoading(tx: Tx, now: number): Promise<void> {
	await tx.insert(settings).values({ key: KEY, value: 'loading', changedAt: now });
}

export async function markLoaded(tx: Tx, now: number): Promise<void> {
	await tx.update(settings).set({ value: 'loaded', changedAt: now }).where(eq(settings.key, KEY));
}
