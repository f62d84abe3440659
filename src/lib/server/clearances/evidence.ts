import { and, desc, eq, gt, inArray, or } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { outcomeReadAs } from '$lib/domain/bedside/read-as';
import type { ClearanceEvidence, EvidenceEscalation } from '$lib/domain/clearances/forms';
import type { ShownEvidence } from '$lib/domain/clearances/views';
import { toRfc3339 } from '$lib/domain/core/instant';
import { localDateOf } from '$lib/domain/core/time';
import { standingWound } from '$lib/domain/wounds/stand';
import type { EpisodeRow } from '../access/access';
import { amendmentsOf, notInError } from '../bedside/queries';
import type { Reader } from '../db';
import { bedsideSessions, escalations, findings } from '../db/schema';
import { env } from '../env';
import type { EpisodeFacts } from '../episodes/facts';
import { linesInOf, oxygenOf } from '../lines/queries';
import { listWoundNotes } from '../wounds/queries';

const SESSIONS_SHOWN = 3;
const OPEN = ['raised', 'taken'] as const;

/**
 * What a decider needs in fifteen seconds, as it is now; stored with the ask and with the decision.
 * @param span what was recorded after `since` is shown however much it is, up to `now`
 */
export async function gatherEvidence(
	db: Reader,
	episode: EpisodeRow,
	facts: EpisodeFacts,
	{ now, since }: { now: number; since: number }
): Promise<ClearanceEvidence> {
	const [wounds, sessions, calls, lines, oxygen] = await Promise.all([
		listWoundNotes(db, episode.id),
		sessionsOf(db, episode.id, since),
		escalationsOf(db, episode.id, since),
		linesInOf(db, [episode.id]),
		oxygenOf(db, [episode.id])
	]);
	const { operation } = facts;
	return {
		at: toRfc3339(now),
		procedure: operation?.procedure ?? null,
		approach: operation?.approach ?? null,
		operatedOn: operation && localDateOf(operation.operatedAt, env().hospital.zone),
		postOpDay: facts.postOpDay,
		level: episode.level,
		betaBlocked: episode.betaBlocked,
		rhythm: episode.rhythm,
		wound: standingWound(wounds),
		lines: lines.get(episode.id) ?? [],
		oxygen: oxygen.get(episode.id) ?? null,
		precautions: facts.precautions,
		sessions,
		escalations: calls
	};
}

/** Wound, lines, oxygen, sessions and calls for help in the evidence are as much a clinical record as on their own pages. */
export function shownTo(person: Person, unitId: string, evidence: ClearanceEvidence): ShownEvidence {
	const withheld = { wound: null, lines: [], oxygen: null, sessions: null };
	return {
		...evidence,
		...(can(person, 'session.read', { unitId }) ? {} : withheld),
		escalations: can(person, 'escalation.read', { unitId }) ? evidence.escalations : null
	};
}

/** The last sessions, and all that were recorded since: one that is entered late may lie before the last. */
async function sessionsOf(db: Reader, episodeId: string, since: number) {
	const last = await db
		.select({ id: bedsideSessions.id })
		.from(bedsideSessions)
		.where(and(eq(bedsideSessions.episodeId, episodeId), notInError()))
		.orderBy(desc(bedsideSessions.startedAt), desc(bedsideSessions.id))
		.limit(SESSIONS_SHOWN);
	const sessions = await db
		.select()
		.from(bedsideSessions)
		.where(
			and(
				eq(bedsideSessions.episodeId, episodeId),
				notInError(),
				or(
					inArray(
						bedsideSessions.id,
						last.map(({ id }) => id)
					),
					gt(bedsideSessions.recordedAt, since)
				)
			)
		)
		.orderBy(desc(bedsideSessions.startedAt), desc(bedsideSessions.id));
	const ids = sessions.map(({ id }) => id);
	const [found, amended] = await Promise.all([
		db.select().from(findings).where(inArray(findings.sessionId, ids)),
		amendmentsOf(db, ids)
	]);
	return sessions.map(({ id, startedAt, outcome }) => {
		const own = found.filter((finding) => finding.sessionId === id);
		return {
			id,
			startedAt: toRfc3339(startedAt),
			outcome,
			readAs: outcomeReadAs(outcome, own),
			findings: own.filter(counts).map(({ reason }) => reason),
			amendments: amended.filter(({ sessionId }) => sessionId === id).map(({ body }) => body)
		};
	});
}

/** Notes explain a rule to whoever stands at the bed; that something was not measured matters to a decider too. */
function counts({ grade, rule }: typeof findings.$inferSelect): boolean {
	return grade !== 'note' || rule === 'reading-missing';
}

/** Open calls for help, and those raised or ended since, which may have been settled meanwhile. */
async function escalationsOf(db: Reader, episodeId: string, since: number): Promise<EvidenceEscalation[]> {
	const rows = await db
		.select({
			id: escalations.id,
			grade: escalations.grade,
			state: escalations.state,
			situation: escalations.situation,
			raisedAt: escalations.raisedAt
		})
		.from(escalations)
		.where(
			and(
				eq(escalations.episodeId, episodeId),
				or(
					inArray(escalations.state, [...OPEN]),
					gt(escalations.raisedAt, since),
					gt(escalations.endedAt, since)
				)
			)
		)
		.orderBy(desc(escalations.raisedAt), desc(escalations.id));
	return rows.map((row) => ({ ...row, raisedAt: toRfc3339(row.raisedAt) }));
}
