import { and, eq, isNull } from 'drizzle-orm';
import { HOUR } from '$lib/domain/core/time';
import { mailText } from '$lib/domain/messages/templates';
import type { Tx } from '../db';
import { invitations } from '../db/schema';
import { newId } from '../ids';
import { linkDigest, linkToken } from '../links';
import type { NewMessage } from '../outbox/enqueue';

/** Long enough for a weekend off. */
export const INVITATION_LIFE_MS = 72 * HOUR;

/**
 * Invite the owner of an account to choose a password. Earlier links of theirs end, so that only the newest mail
 * works. As with calls for help the link's secret is derived at the moment of sending: neither the outbox nor a
 * backup of it opens anybody's account.
 * @returns the mail to enqueue with the change that it belongs to
 */
export async function invite(tx: Tx, userId: string, now: number): Promise<NewMessage> {
	await endInvitations(tx, userId, now);
	const id = newId();
	const expiresAt = now + INVITATION_LIFE_MS;
	await tx.insert(invitations).values({
		id,
		kind: 'account',
		tokenHash: linkDigest(linkToken(id)),
		userId,
		createdAt: now,
		expiresAt
	});
	const { subject, text } = mailText('invitation', { link: '{link}' });
	return {
		kind: 'mail',
		channel: 'mail',
		causeKey: `invitation:${id}`,
		userId,
		subject,
		body: text,
		linkId: id,
		ref: { kind: 'account', id: userId },
		expiresAt
	};
}

/** Let no link of this account work any more. */
export async function endInvitations(tx: Tx, userId: string, now: number): Promise<void> {
	await tx
		.update(invitations)
		.set({ usedAt: now })
		.where(and(eq(invitations.userId, userId), isNull(invitations.usedAt)));
}
