import { eq } from 'drizzle-orm';
import { LEVELS } from '$lib/domain/core/codes';
import type { PersonContext } from '../../context';
import { db } from '../../db';
import { episodes } from '../../db/schema';
import { decideLevel } from '../../levels/actions';

/**
 * The stories tell of a few sessions and not of every day between them. Where the next one starts higher than a
 * session leads by itself, the round has decided on the level below it.
 */
export async function decideOnTheRound(
	as: PersonContext,
	episodeId: string,
	sessionLevel: number
): Promise<void> {
	const [stay] = await db().select().from(episodes).where(eq(episodes.id, episodeId));
	const to = LEVELS.find((level) => level === sessionLevel - 1);
	if (stay && stay.phase === 'inpatient' && to !== undefined && to > stay.level) {
		const reason = 'Walks as far with the nurses since yesterday, readings steady.';
		await decideLevel(as, episodeId, { to, reason });
	}
}
