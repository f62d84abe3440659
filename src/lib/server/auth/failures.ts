import { eq, inArray, sql } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import { db } from '../db';
import { signInFailures } from '../db/schema';
import { digestSecret } from './lucia';

/**
 * Slow down guessing without letting a stranger lock a nurse out: after five failures the wait doubles from one
 * second, up to fifteen minutes, and the right password works after it. Counters survive a restart.
 * Figures: the product's own, after OWASP ASVS 5.0.0, 6.3.1.
 */
const FREE_FAILURES_ACCOUNT = 5;
const FREE_FAILURES_ADDRESS = 20;
const LONGEST_WAIT_MS = 15 * 60 * 1000;
const FORGET_AFTER_MS = 15 * 60 * 1000;

function subjects(email: string, address: string | null): { key: string; free: number }[] {
	const account = { key: `account:${digestSecret(email)}`, free: FREE_FAILURES_ACCOUNT };
	return address
		? [account, { key: `address:${digestSecret(address)}`, free: FREE_FAILURES_ADDRESS }]
		: [account];
}

/** @throws Problem `too-many` with the seconds to wait */
export async function refuseWhileBlocked(email: string, address: string | null, now: number): Promise<void> {
	const keys = subjects(email, address).map((s) => s.key);
	const rows = await db().select().from(signInFailures).where(inArray(signInFailures.subject, keys));
	const until = Math.max(0, ...rows.map((row) => row.blockedUntil ?? 0));
	if (until > now) {
		const seconds = Math.ceil((until - now) / 1000);
		throw new Problem('too-many', `Too many failed sign-ins. Try again in ${seconds} seconds.`, {
			retryAfterSeconds: seconds
		});
	}
}

export async function countFailure(email: string, address: string | null, now: number): Promise<void> {
	for (const { key, free } of subjects(email, address)) {
		const fresh = sql`case when ${signInFailures.lastAt} < ${now - FORGET_AFTER_MS} then 1 else ${signInFailures.count} + 1 end`;
		const [row] = await db()
			.insert(signInFailures)
			.values({ subject: key, count: 1, lastAt: now })
			.onConflictDoUpdate({ target: signInFailures.subject, set: { count: fresh, lastAt: now } })
			.returning({ count: signInFailures.count });
		const over = (row?.count ?? 0) - free;
		if (over >= 0) {
			const wait = Math.min(LONGEST_WAIT_MS, 1000 * 2 ** Math.min(over, 20));
			await db()
				.update(signInFailures)
				.set({ blockedUntil: now + wait })
				.where(eq(signInFailures.subject, key));
		}
	}
}

export async function forgetFailures(email: string): Promise<void> {
	await db()
		.delete(signInFailures)
		.where(eq(signInFailures.subject, `account:${digestSecret(email)}`));
}
