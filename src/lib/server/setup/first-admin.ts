import { and, eq, gt, isNull } from 'drizzle-orm';
import { HOUR } from '$lib/domain/core/time';
import { routes } from '$lib/routes';
import { systemContext } from '../context';
import { db } from '../db';
import { invitations, users } from '../db/schema';
import { env } from '../env';
import { newId, newSecret } from '../ids';
import { linkDigest } from '../links';
import { write } from '../write';

export const FIRST_ADMIN_LIFE_MS = 24 * HOUR;

/**
 * A hospital without anybody gets a link for its first administrator; of several starts the newest link counts.
 * Only its SHA-256 is stored, so who lost it starts the server again.
 * @returns the link, or null when there is somebody already
 */
export async function inviteFirstAdmin(now: number): Promise<string | null> {
	if ((await db().$count(users)) > 0) {
		return null;
	}
	const [id, token] = [newId(), newSecret()];
	await write(systemContext('setup', now), 'anyone', async (tx) => {
		const open = and(eq(invitations.kind, 'first-admin'), isNull(invitations.usedAt));
		await tx
			.update(invitations)
			.set({ expiresAt: now })
			.where(and(open, gt(invitations.expiresAt, now)));
		await tx.insert(invitations).values({
			id,
			kind: 'first-admin',
			tokenHash: linkDigest(token),
			createdAt: now,
			expiresAt: now + FIRST_ADMIN_LIFE_MS
		});
		return {
			result: null,
			audit: { action: 'account.invited', objectKind: 'invitation', objectId: id }
		};
	});
	return env().publicUrl + routes.invitation(token);
}

/** Print the link where only who started the server sees it; it is not for the log, which is kept and passed on. */
export function printFirstAdminLink(link: string): void {
	const hours = FIRST_ADMIN_LIFE_MS / HOUR;
	process.stdout.write(
		`\nNobody has an account yet. The first administrator opens this link, once, within ${hours} hours:\n\n  ${link}\n\n`
	);
}
