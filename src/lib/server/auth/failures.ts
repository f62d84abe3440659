import { eq, inArray, sql } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import { transact, type Tx } from '../db';
import { signInFailures } from '../db/schema';
import { digestSecret } from './lucia';

/**
 * Slow down guessing without letting a stranger lock a nurse out: after five failures the wait doubles from one
 * second, up to fifteen minutes, and the right password works after it. Counters survive a restart.
 * Figures: the product's own, after OWASP ASVS 5.0.0, 6.3.1.
 *
 * An attempt counts as failed before the password is checked, which is slow, and is taken back when it was right:
 * of many guesses at once no more get through than one after the other.
 */
const FREE_FAILURES_ACCOUNT = 5;
const FREE_FAILURES_ADDRESS = 20;
const LONGEST_WAIT_MS = 15 * 60 * 1000;
const FORGET_AFTER_MS = 15 * 60 * 1000;

interface Subject {
	key: string;
	free: number;
}

function accountOf(email: string): Subject {
	return { key: `account:${digestSecret(email)}`, free: FREE_FAILURES_ACCOUNT };
}

function addressOf(address: string): Subject {
	return { key: `address:${digestSecret(address)}`, free: FREE_FAILURES_ADDRESS };
}

/**
 * Count an attempt at a password, before it is checked.
 * @throws Problem `too-many` with the seconds to wait; such an attempt does not count
 */
export async function countAttempt(email: string, address: string | null, now: number): Promise<void> {
	const subjects = [accountOf(email), ...(address === null ? [] : [addressOf(address)])];
	await transact(async (tx) => {
		await refuseWhileBlocked(tx, subjects, now);
		for (const subject of subjects) {
			await count(tx, subject, now);
		}
	});
}

/** The attempt was right: the account's failures are forgotten, the address gets back what this attempt cost it. */
export async function forgetAttempt(tx: Tx, email: string, address: string | null): Promise<void> {
	await forgetFailures(tx, email);
	if (address !== null) {
		await tx
			.update(signInFailures)
			.set({ count: sql`max(0, ${signInFailures.count} - 1)`, blockedUntil: null })
			.where(eq(signInFailures.subject, addressOf(address).key));
	}
}

/** The owner of the account has shown another way who they are. */
export async function forgetFailures(tx: Tx, email: string): Promise<void> {
	await tx.delete(signInFailures).where(eq(signInFailures.subject, accountOf(email).key));
}

async function refuseWhileBlocked(tx: Tx, subjects: Subject[], now: number): Promise<void> {
	const keys = subjects.map(({ key }) => key);
	const rows = await tx.select().from(signInFailures).where(inArray(signInFailures.subject, keys));
	const until = Math.max(0, ...rows.map((row) => row.blockedUntil ?? 0));
	if (until > now) {
		const seconds = Math.ceil((until - now) / 1000);
		throw new Problem('too-many', `Too many failed sign-ins. Try again in ${seconds} seconds.`, {
			retryAfterSeconds: seconds
		});
	}
}

async function count(tx: Tx, { key, free }: Subject, now: number): Promise<void> {
	const next = sql`case when ${signInFailures.lastAt} < ${now - FORGET_AFTER_MS} then 1 else ${signInFailures.count} + 1 end`;
	const [row] = await tx
		.insert(signInFailures)
		.values({ subject: key, count: 1, lastAt: now })
		.onConflictDoUpdate({ target: signInFailures.subject, set: { count: next, lastAt: now } })
		.returning({ count: signInFailures.count });
	const over = (row?.count ?? 0) - free;
	if (over >= 0) {
		const wait = Math.min(LONGEST_WAIT_MS, 1000 * 2 ** Math.min(over, 20));
		await tx
			.update(signInFailures)
			.set({ blockedUntil: now + wait })
			.where(eq(signInFailures.subject, key));
	}
}
