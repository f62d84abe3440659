import { desc, eq, inArray } from 'drizzle-orm';
import type { ClearanceEvidence } from '$lib/domain/clearances/forms';
import { toRfc3339 } from '$lib/domain/core/instant';
import { localDateOf } from '$lib/domain/core/time';
import type { EpisodeRow } from '../access/access';
import type { Reader } from '../db';
import { bedsideSessions, findings } from '../db/schema';
import { env } from '../env';
import type { EpisodeFacts } from '../episodes/facts';
import { newestWoundNote } from '../wounds/queries';

const SESSIONS_SHOWN = 3;

/** What a decider needs in fifteen seconds, as it is now; stored with the ask and with the decision. */
export async function gatherEvidence(
	db: Reader,
	episode: EpisodeRow,
	facts: EpisodeFacts,
	now: number
): Promise<ClearanceEvidence> {
	const sessions = await db
		.select()
		.from(bedsideSessions)
		.where(eq(bedsideSessions.episodeId, episode.id))
		.orderBy(desc(bedsideSessions.startedAt))
		.limit(SESSIONS_SHOWN);
	const found = await db
		.select()
		.from(findings)
		.where(
			inArray(
				findings.sessionId,
				sessions.map((session) => session.id)
			)
		);
	const { operation } = facts;
	return {
		at: toRfc3339(now),
		procedure: facts.operation?.procedure ?? null,
		approach: facts.operation?.approach ?? null,
		operatedOn: operation && localDateOf(operation.operatedAt, env().hospital.zone),
		postOpDay: facts.postOpDay,
		level: episode.level,
		betaBlocked: episode.betaBlocked,
		rhythm: episode.rhythm,
		wound: await newestWoundNote(db, episode.id),
		precautions: facts.precautions,
		sessions: sessions.map((session) => ({
			id: session.id,
			startedAt: toRfc3339(session.startedAt),
			outcome: session.outcome,
			findings: found
				.filter((finding) => finding.sessionId === session.id && finding.grade !== 'note')
				.map((finding) => finding.reason)
		}))
	};
}
