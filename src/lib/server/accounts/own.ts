import { and, desc, eq, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import type { createTokenBody } from '$lib/domain/accounts/forms';
import { invalidField, notFound } from '$lib/domain/core/errors';
import { endCredentials } from '../auth/credentials';
import { countAttempt, forgetAttempt } from '../auth/failures';
import { digestSecret } from '../auth/lucia';
import { hashPassword, passwordFits } from '../auth/passwords';
import type { PersonContext } from '../context';
import { db } from '../db';
import { personalTokens, users } from '../db/schema';
import { newId, newSecret } from '../ids';
import { write } from '../write';
import { accountEvent } from './event';

/** A program's token as its owner sees it afterwards; the token itself is shown once and not kept. */
export interface TokenLine {
	id: string;
	name: string;
	/** Milliseconds UTC. */
	createdAt: number;
}

/** The tokens of a person that still work, the newest first. */
export function tokensOf({ actor }: PersonContext): Promise<TokenLine[]> {
	return db()
		.select({ id: personalTokens.id, name: personalTokens.name, createdAt: personalTokens.createdAt })
		.from(personalTokens)
		.where(and(eq(personalTokens.userId, actor.id), isNull(personalTokens.revokedAt)))
		.orderBy(desc(personalTokens.createdAt), desc(personalTokens.id));
}

/**
 * Choose another password. The current one is asked for, and wrong tries count as failed sign-ins: who finds an
 * open screen must not be able to guess it there. All other sign-ins of the account end, and its tokens.
 * @param signInId the browser's own sign-in, which goes on; null ends them all
 * @throws Problem `invalid` at `/current`, `too-many`
 */
export async function changePassword(
	context: PersonContext,
	signInId: string | null,
	{ current, next }: { current: string; next: string }
): Promise<void> {
	const { actor, address, now } = context;
	const [user] = await db().select().from(users).where(eq(users.id, actor.id));
	if (!user) {
		throw notFound('account');
	}
	await countAttempt(user.email, address, now);
	if (!(await passwordFits(user.passwordHash, current))) {
		throw invalidField('/current', 'This is not your current password.');
	}
	const passwordHash = await hashPassword(next);
	await write({ ...context, key: null }, 'own-account.change', async (tx) => {
		await tx.update(users).set({ passwordHash }).where(eq(users.id, actor.id));
		await forgetAttempt(tx, user.email, address);
		const ended = await endCredentials(tx, actor.id, now, 'password-set', signInId);
		return {
			result: null,
			audit: [{ action: 'account.password-set', objectKind: 'account', objectId: actor.id }, ...ended],
			events: [accountEvent('password-set', actor.id)]
		};
	});
}

/**
 * Make a token for a program that acts as this person.
 * @returns the token, to be shown once; null when the form was sent a second time, because only its digest is kept
 */
export async function makeToken(
	context: PersonContext,
	{ name }: z.infer<typeof createTokenBody>
): Promise<string | null> {
	const [id, token] = [newId(), `ropewalk_${newSecret()}`];
	const { replayed } = await write(context, 'own-account.change', async (tx) => {
		await tx.insert(personalTokens).values({
			id,
			userId: context.actor.id,
			name,
			tokenHash: digestSecret(token),
			createdAt: context.now
		});
		return {
			result: { id },
			audit: { action: 'account.token-made', objectKind: 'token', objectId: id }
		};
	});
	return replayed ? null : token;
}

/** End a token of one's own. */
export async function revokeToken(context: PersonContext, id: string): Promise<void> {
	await write(context, 'own-account.change', async (tx) => {
		const own = and(eq(personalTokens.id, id), eq(personalTokens.userId, context.actor.id));
		const [revoked] = await tx
			.update(personalTokens)
			.set({ revokedAt: context.now })
			.where(and(own, isNull(personalTokens.revokedAt)))
			.returning({ id: personalTokens.id });
		if (!revoked) {
			throw notFound('token');
		}
		return {
			result: { id },
			audit: { action: 'account.token-revoked', objectKind: 'token', objectId: id },
			// Open streams look at their credential again when they hear this.
			events: [accountEvent('token-revoked', context.actor.id)]
		};
	});
}
