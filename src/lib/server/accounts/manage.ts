import { and, eq, inArray, isNotNull, isNull } from 'drizzle-orm';
import type { z } from 'zod';
import type { createAccountBody, createUnitBody } from '$lib/domain/accounts/forms';
import type { AuditAction, AuditEvent } from '$lib/domain/audit/actions';
import type { Role } from '$lib/domain/core/codes';
import { Problem, invalidField, notFound } from '$lib/domain/core/errors';
import { MAY_BE_SENIOR } from '$lib/domain/bedside/sign-off';
import { PhoneError, normalisePhone } from '$lib/domain/messages/phone';
import { endCredentials } from '../auth/credentials';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { units, users, userUnits } from '../db/schema';
import { env } from '../env';
import { seekForHolder } from '../escalations/out-of-reach';
import { newId } from '../ids';
import { bringing, write, type Change, type Written } from '../write';
import { accountEvent } from './event';
import { endInvitations, invite } from './invite';

type Made = Promise<Written<{ id: string }>>;

/**
 * Make an account and mail its owner a link to choose a password.
 * @throws Problem `invalid` for an address or unit that does not fit, no unit for anybody but an administrator, or
 * a telephone number that is none
 */
export function createAccount(context: PersonContext, input: z.infer<typeof createAccountBody>): Made {
	return write(context, 'account.manage', async (tx) => {
		const { name, email, role } = input;
		const phone = phoneOf(input.phone);
		await refuseKnownAddress(tx, email);
		refuseNoUnit(role, input.units);
		await requireUnits(tx, input.units);
		const id = newId();
		await tx
			.insert(users)
			.values({ id, email, name, role, phone, passwordHash: null, createdAt: context.now });
		await insertMemberships(tx, id, input.units);
		return {
			result: { id },
			audit: [audited('account.created', id, { role }), audited('account.invited', id)],
			messages: [await invite(tx, id, context.now)]
		};
	});
}

/** Mail a new link: the first one got lost or old, or the password is forgotten. */
export function inviteAgain(context: PersonContext, userId: string): Made {
	return write(context, 'account.manage', async (tx) => {
		const user = await accountById(tx, userId);
		if (user.disabledAt !== null) {
			throw new Problem('wrong-state', 'The account is disabled; enable it first.', { state: 'disabled' });
		}
		return {
			result: { id: userId },
			audit: audited('account.invited', userId),
			messages: [await invite(tx, userId, context.now)]
		};
	});
}

/**
 * Disable an account: its sign-ins, tokens and links end at once, and so do its open streams. What its owner did
 * stays theirs on record; for a call for help that they have, others are sought.
 */
export function disableAccount(context: PersonContext, userId: string): Made {
	return write(context, 'account.manage', async (tx) => {
		if (userId === context.actor.id) {
			throw new Problem('wrong-state', 'Nobody disables their own account; another administrator can.');
		}
		await accountById(tx, userId);
		const [disabled] = await tx
			.update(users)
			.set({ disabledAt: context.now })
			.where(and(eq(users.id, userId), isNull(users.disabledAt)))
			.returning({ id: users.id });
		if (!disabled) {
			throw new Problem('wrong-state', 'The account is disabled already.', { state: 'disabled' });
		}
		await endInvitations(tx, userId, context.now);
		const ended = await endCredentials(tx, userId, context.now, 'disabled');
		const calls = await seekForHolder(tx, context, userId);
		return bringing(changed('account.disabled', 'disabled', userId, { ended }), calls);
	});
}

/**
 * Let the owner of a disabled account sign in again, with the password they had. Nothing else of before works: a
 * database of an older version can hold tokens that outlived the disabling.
 */
export function enableAccount(context: PersonContext, userId: string): Made {
	return write(context, 'account.manage', async (tx) => {
		await accountById(tx, userId);
		const [enabled] = await tx
			.update(users)
			.set({ disabledAt: null })
			.where(and(eq(users.id, userId), isNotNull(users.disabledAt)))
			.returning({ id: users.id });
		if (!enabled) {
			throw new Problem('wrong-state', 'The account is enabled already.', { state: 'enabled' });
		}
		const ended = await endCredentials(tx, userId, context.now, 'enabled');
		return changed('account.enabled', 'enabled', userId, { ended });
	});
}

/**
 * Say which units somebody belongs to from now on; what they may see follows with their next request. For a call
 * for help that they have and cannot see any more others are sought.
 */
export function setUnits(context: PersonContext, userId: string, unitIds: string[]): Made {
	return write(context, 'account.manage', async (tx) => {
		const { role } = await accountById(tx, userId);
		refuseNoUnit(role, unitIds);
		await requireUnits(tx, unitIds);
		await tx.delete(userUnits).where(eq(userUnits.userId, userId));
		await insertMemberships(tx, userId, unitIds);
		const detail = { units: unitIds.length };
		const calls = await seekForHolder(tx, context, userId);
		return bringing(changed('account.units-set', 'units-set', userId, { detail }), calls);
	});
}

/** Mark somebody as senior, or no longer: it counts from their next request on. */
export function setSenior(context: PersonContext, userId: string, senior: boolean): Made {
	return write(context, 'account.manage', async (tx) => {
		const { role } = await accountById(tx, userId);
		if (!MAY_BE_SENIOR.some((each) => each === role)) {
			throw new Problem('wrong-state', `The role ${role} is not marked as senior.`, { state: role });
		}
		await tx.update(users).set({ senior }).where(eq(users.id, userId));
		return changed('account.senior-set', 'senior-set', userId, { detail: { senior: senior ? 1 : 0 } });
	});
}

/** Make a unit in the hospital's time zone. */
export function createUnit(context: PersonContext, { name, kind }: z.infer<typeof createUnitBody>): Made {
	return write(context, 'account.manage', async (tx) => {
		const [known] = await tx.select({ id: units.id }).from(units).where(eq(units.name, name));
		if (known) {
			throw invalidField('/name', `There is a unit "${name}" already.`);
		}
		const id = newId();
		await tx.insert(units).values({ id, name, kind, zone: env().hospital.zone });
		return {
			result: { id },
			audit: { action: 'unit.created', objectKind: 'unit', objectId: id, detail: { kind } }
		};
	});
}

async function accountById(tx: Tx, userId: string) {
	const [user] = await tx.select().from(users).where(eq(users.id, userId));
	if (!user) {
		throw notFound('account');
	}
	return user;
}

function phoneOf(text: string | undefined): string | null {
	if (!text) {
		return null;
	}
	try {
		return normalisePhone(text);
	} catch (error) {
		if (error instanceof PhoneError) {
			throw invalidField('/phone', error.message);
		}
		throw error;
	}
}

async function refuseKnownAddress(tx: Tx, email: string): Promise<void> {
	if ((await tx.$count(users, eq(users.email, email))) > 0) {
		throw invalidField('/email', `There is an account with the address ${email} already.`);
	}
}

/** Without a unit one sees no patient: an account that is good for nothing is a mistake. Administrators see none anyway. */
function refuseNoUnit(role: Role, unitIds: string[]): void {
	if (role !== 'admin' && unitIds.length === 0) {
		throw invalidField(
			'/units',
			'The units are empty: choose at least one, or this account sees no patient.'
		);
	}
}

async function requireUnits(tx: Tx, unitIds: string[]): Promise<void> {
	const wanted = [...new Set(unitIds)];
	const found = await tx.select({ id: units.id }).from(units).where(inArray(units.id, wanted));
	const missing = wanted.find((id) => !found.some((unit) => unit.id === id));
	if (missing !== undefined) {
		throw invalidField('/units', `There is no unit ${missing}.`);
	}
}

async function insertMemberships(tx: Tx, userId: string, unitIds: string[]): Promise<void> {
	const rows = [...new Set(unitIds)].map((unitId) => ({ userId, unitId }));
	if (rows.length > 0) {
		await tx.insert(userUnits).values(rows);
	}
}

type Detail = Record<string, string | number>;

function audited(action: AuditAction, objectId: string, detail: Detail | null = null) {
	return { action, objectKind: 'account', objectId, ...(detail ? { detail } : {}) };
}

function changed(
	action: AuditAction,
	kind: string,
	id: string,
	{ detail = null, ended = [] }: { detail?: Detail | null; ended?: AuditEvent[] } = {}
): Change<{ id: string }> {
	return {
		result: { id },
		audit: [audited(action, id, detail), ...ended],
		events: [accountEvent(kind, id)]
	};
}
