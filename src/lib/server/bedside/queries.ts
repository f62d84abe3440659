import { asc, desc, eq, inArray, sql } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { activityByCode } from '$lib/domain/bedside/activities/activities';
import type { ActivityCode } from '$lib/domain/bedside/activities/codes';
import type { Reading } from '$lib/domain/bedside/forms';
import type { SessionLine } from '$lib/domain/bedside/views';
import { toRfc3339 } from '$lib/domain/core/instant';
import { accessEpisode } from '../access/access';
import type { Reader } from '../db';
import { bedsideSessions, findings, readings, sessionAmendments, users } from '../db/schema';

/** The newest sessions of an episode, newest first, each with its readings and findings. */
export async function listSessions(
	db: Reader,
	person: Person,
	episodeId: string,
	limit = 30
): Promise<SessionLine[]> {
	await accessEpisode(db, person, episodeId, 'session.read');
	const sessions = await db
		.select({ session: bedsideSessions, recordedBy: users.name })
		.from(bedsideSessions)
		.innerJoin(users, eq(users.id, bedsideSessions.recordedBy))
		.where(eq(bedsideSessions.episodeId, episodeId))
		.orderBy(desc(bedsideSessions.startedAt), desc(bedsideSessions.id))
		.limit(limit);
	const ids = sessions.map(({ session }) => session.id);
	const [measured, found, amended] = await Promise.all([
		db.select().from(readings).where(inArray(readings.sessionId, ids)).orderBy(asc(readings.ordinal)),
		db.select().from(findings).where(inArray(findings.sessionId, ids)).orderBy(asc(findings.ordinal)),
		amendmentsOf(db, ids)
	]);
	return sessions.map(({ session, recordedBy }) => {
		const own = measured.filter((row) => row.sessionId === session.id);
		const phase = (name: 'before' | 'during' | 'after') => own.filter((r) => r.phase === name).map(toReading);
		return {
			id: session.id,
			startedAt: toRfc3339(session.startedAt),
			endedAt: toRfc3339(session.endedAt),
			level: session.level,
			outcome: session.outcome,
			limitSet: session.limitSet,
			limitVersion: session.limitVersion,
			recordedBy,
			recordedById: session.recordedBy,
			recordedAt: toRfc3339(session.recordedAt),
			activities: session.activities.map(toActivity),
			symptoms: session.symptoms.map((s) => (typeof s === 'string' ? s : (s as { code: string }).code)),
			before: phase('before')[0] ?? {},
			during: phase('during'),
			after: phase('after')[0] ?? {},
			findings: found.filter((f) => f.sessionId === session.id).map(toFinding),
			bars: session.bars,
			deviation: session.deviation as { reason: string } | null,
			amendments: amended
				.filter(({ sessionId }) => sessionId === session.id)
				.map(({ sessionId: _session, at, ...row }) => ({ ...row, at: toRfc3339(at) }))
		};
	});
}

/** Left out of what counts: a session that was entered in error stays on record and says nothing about the patient. */
export function notInError() {
	return sql`not exists (select 1 from session_amendments where session_amendments.session_id = ${bedsideSessions.id}
		and session_amendments.kind = 'entered-in-error')`;
}

/** What was added to sessions after they were recorded, oldest first. */
export function amendmentsOf(db: Reader, sessionIds: string[]) {
	return db
		.select({
			sessionId: sessionAmendments.sessionId,
			kind: sessionAmendments.kind,
			body: sessionAmendments.body,
			by: users.name,
			at: sessionAmendments.at
		})
		.from(sessionAmendments)
		.innerJoin(users, eq(users.id, sessionAmendments.byId))
		.where(inArray(sessionAmendments.sessionId, sessionIds))
		.orderBy(asc(sessionAmendments.at), asc(sessionAmendments.id));
}

function toActivity(activity: unknown): { code: string; name: string } {
	const { code } = activity as { code: ActivityCode };
	return { code, name: activityByCode(code).name };
}

function toReading(row: typeof readings.$inferSelect): Reading {
	const { id: _id, sessionId: _session, phase: _phase, ordinal: _ordinal, at, ...values } = row;
	return { ...values, at: at === null ? null : toRfc3339(at) };
}

function toFinding(row: typeof findings.$inferSelect): SessionLine['findings'][number] {
	const { id: _id, sessionId: _session, ordinal: _ordinal, ...finding } = row;
	return finding as SessionLine['findings'][number];
}
