import type { Cookies } from '@sveltejs/kit';
import { eq } from 'drizzle-orm';
import type { AuditEvent } from '$lib/domain/audit/actions';
import type { Role } from '$lib/domain/core/codes';
import { Problem } from '$lib/domain/core/errors';
import { countAttempt, forgetAttempt } from '../auth/failures';
import { digestSecret } from '../auth/lucia';
import { passwordFits } from '../auth/passwords';
import { unitsOf, type UnitOfPerson } from '../auth/people';
import { endSignIn, forgetInBrowser, keepInBrowser, startSignIn } from '../auth/sign-ins';
import type { Context } from '../context';
import { db, type Tx } from '../db';
import { users } from '../db/schema';
import { deviceIn, unmarkDevice } from '../push/cookie';
import { endDevice, isDevice, takeOverDevice } from '../push/devices';
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
	await countAttempt(input.email, context.address, context.now);
	const [user] = await db().select().from(users).where(eq(users.email, input.email));
	const usable = user && user.disabledAt === null ? user : null;
	if (!(await passwordFits(usable?.passwordHash ?? null, input.password)) || !usable) {
		await recordRefusal(context, user?.id ?? null);
		throw new Problem('sign-in-failed');
	}
	await enter(context, cookies, usable.id, (tx) => forgetAttempt(tx, input.email, context.address));
	return { id: usable.id, name: usable.name, role: usable.role, units: await unitsOf(db(), usable.id) };
}

/** Sign somebody in who has just proved by their invitation who they are. */
export function enterAs(context: Context, cookies: Cookies, userId: string): Promise<void> {
	return enter(context, cookies, userId, () => Promise.resolve());
}

/** The sign-in and its line on record stand together, or neither does. */
async function enter(
	context: Context,
	cookies: Cookies,
	userId: string,
	also: (tx: Tx) => Promise<void>
): Promise<void> {
	let token = '';
	await write({ ...context, key: null }, 'anyone', async (tx) => {
		await also(tx);
		// A new token at each sign-in: one that was planted in the browser before is worth nothing.
		const before = await endSignIn(tx, cookies);
		token = await startSignIn(tx, userId, context.now);
		const ended = await takeOverDevice(tx, deviceIn(cookies), userId, digestSecret(token));
		return {
			result: null,
			audit: [{ action: 'account.signed-in', objectKind: 'account', objectId: userId }, ...ended],
			// Whoever sat here before has left: what this browser still listens to for them ends.
			events: before === null ? [] : [accountEvent('signed-out', before)]
		};
	});
	keepInBrowser(cookies, token);
}

/**
 * End this browser's sign-in, and the notices that it shows. Its other tabs hear of it and look whether they may go on
 * listening.
 */
export async function signOut(context: Context, cookies: Cookies): Promise<void> {
	const { actor } = context;
	if (actor?.kind === 'person') {
		await write({ ...context, key: null }, 'anyone', async (tx) => {
			await endSignIn(tx, cookies);
			const ended = await endDevice(tx, deviceIn(cookies));
			return {
				result: null,
				audit: [{ action: 'account.signed-out', objectKind: 'account', objectId: actor.id }, ...ended],
				events: [accountEvent('signed-out', actor.id)]
			};
		});
	} else {
		await endLeftDevice(context, cookies);
	}
	forgetInBrowser(cookies);
	unmarkDevice(cookies);
}

/** The sign-in had ended by itself before, and its notices go on until somebody signs out. */
async function endLeftDevice(context: Context, cookies: Cookies): Promise<void> {
	const here = deviceIn(cookies);
	if (here === null || !(await isDevice(here))) {
		return;
	}
	await write({ ...context, key: null }, 'anyone', async (tx) => {
		const [first, ...rest] = await endDevice(tx, here);
		const left: AuditEvent = { action: 'account.device-removed', objectKind: 'device', objectId: '-' };
		return { result: null, audit: [first ?? left, ...rest] };
	});
}

async function recordRefusal(context: Context, userId: string | null): Promise<void> {
	await write({ ...context, key: null }, 'anyone', () =>
		Promise.resolve({
			result: null,
			audit: {
				action: 'account.sign-in-failed',
				objectKind: 'account',
				objectId: userId ?? '-',
				outcome: 'refused'
			}
		})
	);
}
