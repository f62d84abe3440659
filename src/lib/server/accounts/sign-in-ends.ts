import { count, lte } from 'drizzle-orm';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { SIGN_IN_MS } from '../auth/lucia';
import { systemContext } from '../context';
import { db, type Tx } from '../db';
import { signIns } from '../db/schema';
import { write } from '../write';

/**
 * End the sign-ins whose shift is over by then, each account's with a line on record. Nothing else removes one for
 * its age: until this has run, readers know it as ended by its instant.
 * @returns how many accounts had one
 */
export async function endSignInsOver(at: number): Promise<number> {
	// Asked every second, and seldom so: looking first keeps the write lock free.
	if ((await accountsOver(db(), at)).length === 0) {
		return 0;
	}
	try {
		const { result } = await write(systemContext('sign-ins', at), 'anyone', async (tx) => {
			const [first, ...rest] = (await accountsOver(tx, at)).map(ended);
			if (!first) {
				throw new NoneOver();
			}
			await tx.delete(signIns).where(over(at));
			return { result: rest.length + 1, audit: [first, ...rest] };
		});
		return result;
	} catch (error) {
		if (error instanceof NoneOver) {
			return 0;
		}
		throw error;
	}
}

/** Thrown to leave the transaction empty when their people signed out since they were found. */
class NoneOver extends Error {}

const over = (at: number) => lte(signIns.createdAt, at - SIGN_IN_MS);

function accountsOver(reader: Pick<Tx, 'select'>, at: number) {
	return reader
		.select({ userId: signIns.userId, signIns: count() })
		.from(signIns)
		.where(over(at))
		.groupBy(signIns.userId);
}

function ended(account: { userId: string; signIns: number }): AuditEvent {
	return {
		action: 'account.sign-ins-ended',
		objectKind: 'account',
		objectId: account.userId,
		detail: { by: 'shift-over', count: account.signIns }
	};
}
