import { and, eq, isNull, ne, or } from 'drizzle-orm';
import type { AuditEvent } from '$lib/domain/audit/actions';
import type { Tx } from '../db';
import { personalTokens, pushDevices, signIns } from '../db/schema';

/**
 * End everything that lets somebody in as this account: its sign-ins, its programs' tokens, and the devices that show
 * its notices, which open calls for help. Whoever had the old password, or held the account before it was disabled, may
 * have made any of them.
 * @param why what goes on record beside each
 * @param keep the one sign-in that goes on, where the person is at the screen; null ends all
 * @returns what goes on record, to follow the change that it belongs to
 */
export async function endCredentials(
	tx: Tx,
	userId: string,
	now: number,
	why: 'password-set' | 'disabled' | 'enabled',
	keep: string | null = null
): Promise<AuditEvent[]> {
	const others = keep === null ? undefined : ne(signIns.id, keep);
	const ended = await tx
		.delete(signIns)
		.where(and(eq(signIns.userId, userId), others))
		.returning({ id: signIns.id });
	const revoked = await tx
		.update(personalTokens)
		.set({ revokedAt: now })
		.where(and(eq(personalTokens.userId, userId), isNull(personalTokens.revokedAt)))
		.returning({ id: personalTokens.id });
	const devices = await endDevices(tx, userId, why, keep);
	const tokens = revoked.map(({ id }) => ({
		action: 'account.token-revoked' as const,
		objectKind: 'token',
		objectId: id,
		detail: { by: why }
	}));
	const rest = [...tokens, ...devices];
	if (ended.length === 0) {
		return rest;
	}
	const count = { by: why, count: ended.length };
	return [
		{ action: 'account.sign-ins-ended', objectKind: 'account', objectId: userId, detail: count },
		...rest
	];
}

async function endDevices(tx: Tx, userId: string, why: string, keep: string | null): Promise<AuditEvent[]> {
	const others = keep === null ? undefined : or(isNull(pushDevices.signInId), ne(pushDevices.signInId, keep));
	const ended = await tx
		.delete(pushDevices)
		.where(and(eq(pushDevices.userId, userId), others))
		.returning({ id: pushDevices.id });
	return ended.map(({ id }) => ({
		action: 'account.device-removed',
		objectKind: 'device',
		objectId: id,
		detail: { by: why }
	}));
}
