import type { Cookies } from '@sveltejs/kit';
import { eq } from 'drizzle-orm';
import type { Role } from '$lib/domain/core/codes';
import { Problem } from '$lib/domain/core/errors';
import { appendAudit } from '../audit/append';
import { countFailure, forgetFailures, refuseWhileBlocked } from '../auth/failures';
import { passwordFits } from '../auth/passwords';
import { unitsOf, type UnitOfPerson } from '../auth/people';
import { endSignIn, startSignIn } from '../auth/sign-ins';
import type { Context } from '../context';
import { db, transact } from '../db';
import { users } from '../db/schema';
import { write } from '../write';
import { accountEvent } from './event';

export interface SignedIn {
	id: string;
	name: string;
	role: Role;
	units: UnitOfPerson[];
}

/**
 * Sign in with e-mail address and password. An unknown address, a wrong password and a disabled account answer
 * the same and take the same time.
 * @throws Problem `sign-in-failed` or `too-many`
 */
export async function signIn(
	context: Context,
	cookies: Cookies,
	input: { email: string; password: string }
): Promise<SignedIn> {
	await refuseWhileBlocked(input.email, context.address, context.now);
	const [user] = await db().select().from(users).where(eq(users.email, input.email));
	const usable = user && user.disabledAt === null ? user : null;
	if (!(await passwordFits(usable?.passwordHash ?? null, input.password)) || !usable) {
		await countFailure(input.email, context.address, context.now);
		await recordSignIn(context, user?.id ?? null, 'refused');
		throw new Problem('sign-in-failed');
	}
	await forgetFailures(input.email);
	await enterAs(context, cookies, usable.id);
	return { id: usable.id, name: usable.name, role: usable.role, units: await unitsOf(db(), usable.id) };
}

/** Sign somebody in who has just proved who they are, by password or by their invitation. */
export async function enterAs(context: Context, cookies: Cookies, userId: string): Promise<void> {
	// A new token at each sign-in: one that was planted in the browser before is worth nothing.
	await endSignIn(cookies);
	await startSignIn(cookies, userId, context.now);
	await recordSignIn(context, userId, 'done');
}

/** End this browser's sign-in. Its other tabs hear of it and look whether they may go on listening. */
export async function signOut(context: Context, cookies: Cookies): Promise<void> {
	await endSignIn(cookies);
	const { actor } = context;
	if (actor?.kind === 'person') {
		await write({ ...context, key: null }, 'anyone', () =>
			Promise.resolve({
				result: null,
				audit: { action: 'account.signed-out', objectKind: 'account', objectId: actor.id },
				events: [accountEvent('signed-out', actor.id)]
			})
		);
	}
}

function recordSignIn(context: Context, userId: string | null, outcome: 'done' | 'refused'): Promise<void> {
	const action = outcome === 'done' ? 'account.signed-in' : 'account.sign-in-failed';
	return transact((tx) =>
		appendAudit(tx, context, [{ action, objectKind: 'account', objectId: userId ?? '-', outcome }])
	);
}
