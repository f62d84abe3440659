import { asc, eq } from 'drizzle-orm';
import { hasFailed, laterStatus, readStatus, type SmsStatus } from '$lib/domain/messages/status';
import type { Reader } from '../db';
import { smsStatuses, type outbox } from '../db/schema';

/** What the gateway's callbacks make of a message that it has accepted. */
export interface Delivery {
	state: Extract<(typeof outbox.$inferSelect)['state'], 'accepted' | 'delivered' | 'undelivered'>;
	reason: string | null;
}

/**
 * The state by all callbacks so far; null when none has come. They come twice, late and in any order, and some
 * come before our own record that the message was accepted.
 */
export async function stateByStatus(reader: Reader, providerId: string): Promise<Delivery | null> {
	const rows = await reader
		.select({ status: smsStatuses.status, errorCode: smsStatuses.errorCode })
		.from(smsStatuses)
		.where(eq(smsStatuses.providerId, providerId))
		.orderBy(asc(smsStatuses.at), asc(smsStatuses.id));
	const known = rows.flatMap(({ status }) => readStatus(status) ?? []);
	const last = known.reduce<SmsStatus | null>(laterStatus, null);
	const code = rows.find(({ status }) => last !== null && readStatus(status) === last)?.errorCode ?? null;
	return last && deliveryOf(last, code);
}

function deliveryOf(status: SmsStatus, errorCode: string | null): Delivery {
	if (status === 'delivered') {
		return { state: 'delivered', reason: null };
	}
	const reason = errorCode === null ? status : `${status}, gateway code ${errorCode}`;
	return hasFailed(status) ? { state: 'undelivered', reason } : { state: 'accepted', reason: null };
}
