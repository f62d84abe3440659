import { and, eq } from 'drizzle-orm';
import { afterDecision } from '$lib/domain/bedside/progress';
import { isSenior, seniorSignsLevel } from '$lib/domain/bedside/sign-off';
import type { Level } from '$lib/domain/core/codes';
import { Problem, invalidField } from '$lib/domain/core/errors';
import type { DecideLevel } from '$lib/domain/levels/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode, type EpisodeRow } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { episodes, levelDecisions, signOffs } from '../db/schema';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';
import { adviceOf, levelOf, type SessionAdvice } from './advice';

/** What became of a decision: made, or waiting for a senior's signature. */
export interface Decided {
	id: string;
	state: 'made' | 'asked';
	/** Today's level after it. */
	level: Level;
}

/**
 * Decide on the level of a patient. Up against the advice of the last session, or by more than one level, a junior
 * proposes and a senior signs; everything else holds at once.
 * @throws Problem `invalid` for the level that holds already, or for going up against the advice without a reason
 */
export function decideLevel(
	context: PersonContext,
	episodeId: string,
	input: DecideLevel
): Promise<Written<Decided>> {
	return write(context, 'level.decide', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'level.decide');
		if (episode.closedAt !== null) {
			throw new Problem('wrong-state', 'The episode is closed.', { state: 'closed' });
		}
		const from = levelOf(episode.level);
		if (from === input.to) {
			throw invalidField('/to', `to is ${input.to}: that is today’s level already.`);
		}
		const advised = await adviceOf(tx, episodeId, from);
		const bold = isBold(from, input.to, advised);
		if (bold && !input.reason) {
			throw invalidField('/reason', 'reason is empty: the last session does not speak for this level.');
		}
		await replaceProposals(tx, context, episodeId);
		return bold && !isSenior(context.actor)
			? propose(tx, context, episode, input)
			: make(tx, context, episode, { ...input, advised, signedBy: bold ? context.actor.id : null });
	});
}

/** Without a session nothing speaks for going up. */
function isBold(from: Level, to: Level, advised: SessionAdvice | null): boolean {
	return advised === null ? to > from : seniorSignsLevel(from, to, advised.advice);
}

interface Making extends DecideLevel {
	advised: SessionAdvice | null;
	signedBy: string | null;
	/** Who decided, where a senior signs for somebody else. */
	decidedBy?: string;
}

/** Make a decision hold, in the transaction of whoever decides or signs. */
export async function make(
	tx: Tx,
	context: PersonContext,
	episode: EpisodeRow,
	{ to, reason, advised, signedBy, decidedBy = context.actor.id }: Making
): Promise<Change<Decided>> {
	const from = levelOf(episode.level);
	const levels = afterDecision(
		{ reached: levelOf(Math.max(episode.level, episode.levelReached)), today: from },
		to
	);
	const id = newId();
	await tx.insert(levelDecisions).values({
		...{ id, episodeId: episode.id, fromLevel: from, toLevel: to, reason: reason ?? null },
		...{ suggestion: advised?.advice.suggestion ?? null, sessionId: advised?.sessionId ?? null },
		...{ decidedBy, decidedAt: context.now, signedBy }
	});
	await tx
		.update(episodes)
		.set({ level: levels.today, levelReached: levels.reached })
		.where(eq(episodes.id, episode.id));
	const threadId = await threadForDeed(tx, episode.id, context.actor);
	const body = m.levels_entry({ from, to, reason: reason ?? '' }).trim();
	const detail = { from, to, signed: signedBy !== null };
	return {
		result: { id, state: 'made', level: levels.today },
		audit: { action: 'level.decided', objectKind: 'level', objectId: id, episodeId: episode.id, detail },
		entries: threadId === null ? [] : [{ threadId, kind: 'event', body }],
		events: [{ topic: 'episode', kind: 'level-decided', id: episode.id, episodeId: episode.id }]
	};
}

async function propose(
	tx: Tx,
	context: PersonContext,
	episode: EpisodeRow,
	{ to, reason }: DecideLevel
): Promise<Change<Decided>> {
	const id = newId();
	const from = levelOf(episode.level);
	await tx.insert(signOffs).values({
		...{ id, episodeId: episode.id, kind: 'level', state: 'asked', toLevel: to },
		...{ words: m.levels_proposed({ from, to, reason: reason ?? '' }) },
		...{ askedBy: context.actor.id, askedAt: context.now }
	});
	return {
		result: { id, state: 'asked', level: from },
		audit: {
			action: 'sign-off.asked',
			objectKind: 'sign-off',
			objectId: id,
			episodeId: episode.id,
			detail: { to }
		},
		events: [{ topic: 'episode', kind: 'sign-off-asked', id: episode.id, episodeId: episode.id }]
	};
}

/** A new decision takes the place of what was proposed before it. */
async function replaceProposals(tx: Tx, context: PersonContext, episodeId: string): Promise<void> {
	await tx
		.update(signOffs)
		.set({ state: 'replaced', decidedBy: context.actor.id, decidedAt: context.now })
		.where(and(eq(signOffs.episodeId, episodeId), eq(signOffs.kind, 'level'), eq(signOffs.state, 'asked')));
}
