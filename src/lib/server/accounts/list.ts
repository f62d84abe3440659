import { and, asc, desc, eq, inArray, isNull } from 'drizzle-orm';
import type { Role } from '$lib/domain/core/codes';
import { can } from '$lib/domain/access/can';
import { Problem } from '$lib/domain/core/errors';
import type { PersonContext } from '../context';
import { db } from '../db';
import { invitations, outbox, units, users, userUnits } from '../db/schema';

/** An account as administrators see it. Instants are milliseconds UTC. */
export interface AccountLine {
	id: string;
	name: string;
	email: string;
	role: Role;
	phone: string | null;
	senior: boolean;
	unitIds: string[];
	createdAt: number;
	disabledAt: number | null;
	/** Whether its owner has ever chosen a password. */
	hasPassword: boolean;
	/** The newest link that was not used yet. */
	invitation: { expiresAt: number; mail: (typeof outbox.$inferSelect)['state'] | null } | null;
}

export interface UnitLine {
	id: string;
	name: string;
	kind: 'intensive-care' | 'ward' | 'gym';
	/** How many accounts belong to it. */
	people: number;
}

/** All accounts by name, and all units with how many belong to each. */
export async function listAccounts({
	actor
}: PersonContext): Promise<{ accounts: AccountLine[]; units: UnitLine[] }> {
	if (!can(actor, 'account.manage')) {
		throw new Problem('not-allowed', `The role ${actor.role} may not do that (account.manage).`);
	}
	const [people, memberships, open, allUnits] = await Promise.all([
		db().select().from(users).orderBy(asc(users.name), asc(users.id)),
		db().select().from(userUnits),
		openInvitations(),
		db().select().from(units).orderBy(asc(units.name))
	]);
	const of = (userId: string) => memberships.filter((row) => row.userId === userId);
	const accounts = people.map(({ passwordHash, ...user }) => ({
		...user,
		unitIds: of(user.id).map(({ unitId }) => unitId),
		hasPassword: passwordHash !== null,
		invitation: open.get(user.id) ?? null
	}));
	const unitLines = allUnits.map(({ id, name, kind }) => {
		const people = memberships.filter(({ unitId }) => unitId === id).length;
		return { id, name, kind, people };
	});
	return { accounts, units: unitLines };
}

async function openInvitations(): Promise<Map<string, AccountLine['invitation']>> {
	const rows = await db()
		.select()
		.from(invitations)
		.where(and(eq(invitations.kind, 'account'), isNull(invitations.usedAt)))
		.orderBy(desc(invitations.createdAt));
	const mails = await db()
		.select({ linkId: outbox.linkId, state: outbox.state })
		.from(outbox)
		.where(
			inArray(
				outbox.linkId,
				rows.map(({ id }) => id)
			)
		);
	return new Map(
		rows.flatMap(({ id, userId, expiresAt }) => {
			const mail = mails.find(({ linkId }) => linkId === id)?.state ?? null;
			return userId === null ? [] : [[userId, { expiresAt, mail }] as const];
		})
	);
}
