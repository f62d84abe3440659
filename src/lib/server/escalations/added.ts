import { and, count, desc, eq, min, ne } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { toRfc3339 } from '$lib/domain/core/instant';
import { ADDED_SHOWN, type EscalationView } from '$lib/domain/escalations/views';
import type { Reader } from '../db';
import { escalationFacts, users } from '../db/schema';
import type { EscalationRow } from './tell';

const named = alias(users, 'named');

/** Everybody but its raiser who has called into an escalation, in the order of their first calls. */
export function otherCallersOf(
	db: Reader,
	{ id, raisedBy }: Pick<EscalationRow, 'id' | 'raisedBy'>
): Promise<EscalationView['otherCallers']> {
	return db
		.select({ id: users.id, name: users.name })
		.from(escalationFacts)
		.innerJoin(users, eq(users.id, escalationFacts.byId))
		.where(and(eq(escalationFacts.escalationId, id), ne(escalationFacts.byId, raisedBy)))
		.groupBy(users.id, users.name)
		.orderBy(min(escalationFacts.at), users.id);
}

/** The newest calls that were added to an escalation, oldest first, and how many there are in all. */
export async function addedTo(db: Reader, id: string): Promise<Pick<EscalationView, 'added' | 'addedTotal'>> {
	const ofThis = eq(escalationFacts.escalationId, id);
	const [rows, [total]] = await Promise.all([
		db
			.select({
				fact: escalationFacts,
				by: { id: users.id, name: users.name, role: users.role },
				named: { id: named.id, name: named.name }
			})
			.from(escalationFacts)
			.innerJoin(users, eq(users.id, escalationFacts.byId))
			.leftJoin(named, eq(named.id, escalationFacts.toldInPerson))
			.where(ofThis)
			.orderBy(desc(escalationFacts.at), desc(escalationFacts.id))
			.limit(ADDED_SHOWN),
		db.select({ count: count() }).from(escalationFacts).where(ofThis)
	]);
	const added = rows.toReversed().map(({ fact, by, named: toldInPerson }) => ({
		id: fact.id,
		by,
		at: toRfc3339(fact.at),
		grade: fact.grade,
		raisedGrade: fact.raisedGrade,
		situation: fact.situation,
		background: fact.background,
		assessment: fact.assessment,
		request: fact.request,
		neededBy: fact.neededBy === null ? null : toRfc3339(fact.neededBy),
		toldInPerson,
		sessionId: fact.sessionId,
		threadId: fact.threadId
	}));
	return { added, addedTotal: total?.count ?? 0 };
}
