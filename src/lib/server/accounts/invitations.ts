import { and, eq, gt, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import type { Person } from '$lib/domain/access/actor';
import type { firstAdminBody } from '$lib/domain/accounts/forms';
import { Problem } from '$lib/domain/core/errors';
import { endCredentials } from '../auth/credentials';
import { forgetFailures } from '../auth/failures';
import { hashPassword } from '../auth/passwords';
import { loadPerson } from '../auth/people';
import type { Context } from '../context';
import { db, type Reader, type Tx } from '../db';
import { invitations, users } from '../db/schema';
import { newId } from '../ids';
import { linkDigest } from '../links';
import { write } from '../write';
import { accountEvent } from './event';

/** What the page of an invitation shows. A link of nobody we know, and one of a disabled account, look the same. */
export type InvitationView =
	| { state: 'open'; kind: 'first-admin' }
	| { state: 'open'; kind: 'account'; name: string; email: string }
	| { state: 'used' | 'expired' | 'unknown' };

/** Look at an invitation without using it: link previews must not use it up. */
export async function lookAtInvitation(token: string, now: number): Promise<InvitationView> {
	const row = await findInvitation(db(), token);
	if (!row) {
		return { state: 'unknown' };
	}
	const { invitation, user } = row;
	if (invitation.usedAt !== null || (invitation.kind === 'first-admin' && (await db().$count(users)) > 0)) {
		return { state: 'used' };
	}
	if (invitation.expiresAt <= now) {
		return { state: 'expired' };
	}
	if (invitation.kind === 'first-admin') {
		return { state: 'open', kind: 'first-admin' };
	}
	return user && user.disabledAt === null
		? { state: 'open', kind: 'account', name: user.name, email: user.email }
		: { state: 'unknown' };
}

/**
 * The first administrator makes their own account. It works once, and only while nobody else has one.
 * @returns the new account's identifier
 * @throws Problem `not-found` for a link that does not work any more
 */
export async function becomeFirstAdmin(
	context: Context,
	token: string,
	input: z.infer<typeof firstAdminBody>
): Promise<string> {
	await requireOpen(token, 'first-admin', context.now);
	const passwordHash = await hashPassword(input.password);
	const id = newId();
	const person: Person = { kind: 'person', id, name: input.name, role: 'admin', unitIds: [] };
	await write({ ...context, actor: person, key: null }, 'anyone', async (tx) => {
		await takeUp(tx, token, context.now);
		if ((await tx.$count(users)) > 0) {
			throw worksNoMore();
		}
		const { name, email } = input;
		await tx
			.insert(users)
			.values({ id, email, name, role: 'admin', passwordHash, phone: null, createdAt: context.now });
		return {
			result: null,
			audit: [
				{ action: 'account.created', objectKind: 'account', objectId: id, detail: { role: 'admin' } },
				passwordSet(id)
			]
		};
	});
	return id;
}

/**
 * Somebody invited chooses a password, for a new account or instead of a forgotten one. Sign-ins and tokens of before end.
 * @returns the account's identifier
 * @throws Problem `not-found` for a link that does not work any more
 */
export async function takeUpInvitation(context: Context, token: string, password: string): Promise<string> {
	const { user, person } = await requireOpen(token, 'account', context.now);
	if (!user || !person) {
		throw worksNoMore();
	}
	const passwordHash = await hashPassword(password);
	await write({ ...context, actor: person, key: null }, 'anyone', async (tx) => {
		await takeUp(tx, token, context.now);
		await tx.update(users).set({ passwordHash }).where(eq(users.id, user.id));
		await forgetFailures(tx, user.email);
		const ended = await endCredentials(tx, user.id, context.now, 'password-set');
		return {
			result: null,
			audit: [passwordSet(user.id), ...ended],
			events: [accountEvent('password-set', user.id)]
		};
	});
	return user.id;
}

async function findInvitation(reader: Reader, token: string) {
	const [row] = await reader
		.select({ invitation: invitations, user: users })
		.from(invitations)
		.leftJoin(users, eq(users.id, invitations.userId))
		.where(eq(invitations.tokenHash, linkDigest(token)));
	return row ?? null;
}

/** Asked before a password is hashed, which is slow: a made-up link must not cost more than a look. */
async function requireOpen(token: string, kind: 'first-admin' | 'account', now: number) {
	const [view, row] = await Promise.all([lookAtInvitation(token, now), findInvitation(db(), token)]);
	if (view.state !== 'open' || view.kind !== kind || !row) {
		throw worksNoMore();
	}
	return { user: row.user, person: row.user && (await loadPerson(db(), row.user.id)) };
}

/** Use the invitation up; of two who do it at once one gets through. */
async function takeUp(tx: Tx, token: string, now: number): Promise<void> {
	const [used] = await tx
		.update(invitations)
		.set({ usedAt: now })
		.where(
			and(
				eq(invitations.tokenHash, linkDigest(token)),
				isNull(invitations.usedAt),
				gt(invitations.expiresAt, now)
			)
		)
		.returning({ id: invitations.id });
	if (!used) {
		throw worksNoMore();
	}
}

function worksNoMore(): Problem {
	return new Problem('not-found', 'This link was used already, or it is too old.');
}

function passwordSet(id: string) {
	return {
		action: 'account.password-set',
		objectKind: 'account',
		objectId: id,
		detail: { by: 'invitation' }
	} as const;
}
