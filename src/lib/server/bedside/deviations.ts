import { and, eq, isNull } from 'drizzle-orm';
import type { SessionBody } from '$lib/domain/bedside/forms';
import type { ClearanceKind, ClearanceState } from '$lib/domain/core/codes';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { DeviationLine } from '$lib/domain/episodes/views';
import { CLEARANCE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';
import { accessDeviation } from '../access/access';
import type { PersonContext } from '../context';
import type { Reader, Tx } from '../db';
import { bedsideSessions, deviations, users } from '../db/schema';
import { newId } from '../ids';
import { write, type Written } from '../write';

/** A kind that was not in force, and how it stood then; null when nobody had asked for it. */
export interface Lacking {
	kind: ClearanceKind;
	stood: ClearanceState | null;
}

/**
 * Write down what was done without its clearance. Each is a loose end of whoever decides that kind until one of
 * them has seen it, however the clearance stands: an ask, a hold or a refusal tells nobody that it was done.
 */
export async function insertDeviations(
	tx: Tx,
	context: PersonContext,
	of: { sessionId: string; episodeId: string; threadId: string | null },
	lacking: readonly Lacking[],
	input: SessionBody
): Promise<void> {
	const reason = input.deviation?.reason ?? null;
	if (lacking.length === 0 || reason === null) {
		return;
	}
	await tx.insert(deviations).values(
		lacking.map(({ kind, stood }) => ({
			...of,
			id: newId(),
			kind,
			stood,
			reason,
			recordedBy: context.actor.id,
			recordedAt: context.now
		}))
	);
}

/**
 * A decider has seen what was done without the clearance. It permits nothing: the clearance stays as it stands.
 * @throws Problem `wrong-state` with who has seen it and when; `not-allowed` for whoever did it
 */
export function acknowledgeDeviation(
	context: PersonContext,
	id: string
): Promise<Written<{ id: string; seenAt: string }>> {
	return write(context, 'clearance.decide', async (tx) => {
		const { deviation, episode } = await accessDeviation(tx, context.actor, id, 'clearance.decide');
		if (deviation.recordedBy === context.actor.id) {
			throw new Problem('not-allowed', 'Somebody else has to see what you did without a clearance.');
		}
		await refuseSeen(tx, deviation);
		await tx
			.update(deviations)
			.set({ seenBy: context.actor.id, seenAt: context.now })
			.where(eq(deviations.id, id));
		const { kind, threadId, sessionId } = deviation;
		const body = m.bedside_deviation_seen({ kind: CLEARANCE_WORDS[kind]() });
		return {
			result: { id, seenAt: toRfc3339(context.now) },
			audit: {
				action: 'deviation.acknowledged',
				objectKind: 'deviation',
				objectId: id,
				episodeId: episode.id,
				detail: { kind, sessionId }
			},
			entries: threadId ? [{ threadId, kind: 'event', body, ref: { kind: 'session', id: sessionId } }] : [],
			events: [{ topic: 'session', kind: 'deviation-seen', id: sessionId, episodeId: episode.id }]
		};
	});
}

async function refuseSeen(tx: Tx, { seenBy, seenAt }: typeof deviations.$inferSelect): Promise<void> {
	if (seenBy === null || seenAt === null) {
		return;
	}
	const [person] = await tx.select({ name: users.name }).from(users).where(eq(users.id, seenBy));
	throw new Problem('wrong-state', `${person?.name ?? 'Somebody'} has seen it already.`, {
		seenBy: person?.name ?? null,
		seenAt: toRfc3339(seenAt)
	});
}

/** What was done without its clearance and no decider has seen yet, the oldest first. */
export async function unseenDeviations(db: Reader, episodeId: string): Promise<DeviationLine[]> {
	const rows = await db
		.select({ deviation: deviations, startedAt: bedsideSessions.startedAt, recordedBy: users.name })
		.from(deviations)
		.innerJoin(bedsideSessions, eq(bedsideSessions.id, deviations.sessionId))
		.innerJoin(users, eq(users.id, deviations.recordedBy))
		.where(and(eq(deviations.episodeId, episodeId), isNull(deviations.seenAt)))
		.orderBy(deviations.recordedAt, deviations.id);
	return rows.map(({ deviation, startedAt, recordedBy }) => ({
		id: deviation.id,
		sessionId: deviation.sessionId,
		kind: deviation.kind,
		stood: deviation.stood,
		reason: deviation.reason,
		doneAt: toRfc3339(startedAt),
		recordedBy,
		recordedById: deviation.recordedBy
	}));
}
