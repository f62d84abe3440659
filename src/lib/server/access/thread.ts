import { eq } from 'drizzle-orm';
import type { Actor } from '$lib/domain/access/actor';
import { notFound } from '$lib/domain/core/errors';
import { threadOfDeed } from '$lib/domain/referrals/thread-of-deed';
import type { Reader } from '../db';
import { referrals, threads } from '../db/schema';

/**
 * The thread that a new deed is written into: the named one, else the one it belongs to. Into a withdrawn thread
 * nothing is written any more; what somebody does about the patient is never refused for that.
 *
 * @param actor who does it, null for what no person does
 * @throws Problem `not-found` for a named thread of another patient
 */
export async function threadForDeed(
	db: Reader,
	episodeId: string,
	actor: Actor | null,
	named?: string
): Promise<string | null> {
	const all = await db
		.select({ id: threads.id, state: referrals.state, service: referrals.service })
		.from(threads)
		.innerJoin(referrals, eq(referrals.id, threads.referralId))
		.where(eq(threads.episodeId, episodeId))
		.orderBy(referrals.askedAt);
	const wanted = named === undefined ? undefined : all.find(({ id }) => id === named);
	if (named !== undefined && !wanted) {
		throw notFound('thread');
	}
	const writable = wanted && wanted.state !== 'withdrawn' ? wanted : threadOfDeed(all, actor);
	return writable?.id ?? null;
}
