import { and, asc, desc, eq } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import type { Person } from '$lib/domain/access/actor';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { LevelView } from '$lib/domain/levels/views';
import { accessEpisode } from '../access/access';
import type { Reader } from '../db';
import { levelDecisions, signOffs, users } from '../db/schema';
import { adviceOf, levelOf } from './advice';

const signer = alias(users, 'signer');

/** What is to be known to decide on the level of a patient. */
export async function getLevel(db: Reader, person: Person, episodeId: string): Promise<LevelView> {
	const episode = await accessEpisode(db, person, episodeId, 'session.read');
	const today = levelOf(episode.level);
	const [advised, decisions, open] = await Promise.all([
		adviceOf(db, episodeId, today),
		db
			.select({ decision: levelDecisions, decidedBy: users.name, signedBy: signer.name })
			.from(levelDecisions)
			.innerJoin(users, eq(users.id, levelDecisions.decidedBy))
			.leftJoin(signer, eq(signer.id, levelDecisions.signedBy))
			.where(eq(levelDecisions.episodeId, episodeId))
			.orderBy(desc(levelDecisions.decidedAt), desc(levelDecisions.id)),
		db
			.select({ signOff: signOffs, askedBy: users.name })
			.from(signOffs)
			.innerJoin(users, eq(users.id, signOffs.askedBy))
			.where(and(eq(signOffs.episodeId, episodeId), eq(signOffs.state, 'asked')))
			.orderBy(asc(signOffs.askedAt))
	]);
	return {
		today,
		reached: levelOf(Math.max(episode.level, episode.levelReached)),
		advice: advised && {
			...advised.advice,
			sessionId: advised.sessionId,
			sessionAt: toRfc3339(advised.at),
			sessionLevel: advised.sessionLevel
		},
		decisions: decisions.map(({ decision, decidedBy, signedBy }) => ({
			id: decision.id,
			from: levelOf(decision.fromLevel),
			to: levelOf(decision.toLevel),
			suggestion: decision.suggestion,
			reason: decision.reason,
			decidedBy,
			decidedAt: toRfc3339(decision.decidedAt),
			signedBy
		})),
		signOffs: open.map(({ signOff: { id, kind, words, askedAt }, askedBy }) => ({
			id,
			kind,
			words,
			askedBy,
			askedAt: toRfc3339(askedAt)
		}))
	};
}
