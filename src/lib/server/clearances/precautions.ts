import { Problem } from '$lib/domain/core/errors';
import { daysBetween, localDateOf } from '$lib/domain/core/time';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import { env } from '../env';
import { factsOfOne } from '../episodes/facts';
import { after, write, type Written } from '../write';
import { insertAsk, openOrInForce } from './ask';

const WEEK = 7;

/**
 * Put the end of the sternal precautions to the surgeons without waiting for somebody to ask: what follows is the
 * clearance as any other, decided on its evidence. It ends nothing by itself.
 * @throws Problem `wrong-state` where no sternal precautions hold, `already-asked` or `already-given` as for any ask
 */
export function reviewPrecautions(
	context: PersonContext,
	episodeId: string
): Promise<Written<{ id: string; state: 'asked' }>> {
	return write(context, 'precautions.review', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'precautions.review');
		const facts = await factsOfOne(tx, episode, context.now);
		const { operation, precautions } = facts;
		if (!operation || !precautions.sternal) {
			throw new Problem('wrong-state', m.clearances_no_precautions(), { state: precautions.basis });
		}
		const kind = 'precautions-end';
		const { open, lapsed } = await openOrInForce(tx, context, episodeId, kind, operation.id);
		if (open) {
			const code = open.state === 'asked' ? 'already-asked' : 'already-given';
			throw new Problem(code, m.clearances_precautions_open(), { id: open.id, state: open.state });
		}
		const { zone } = env().hospital;
		const days = daysBetween(localDateOf(operation.operatedAt, zone), localDateOf(context.now, zone));
		const question = m.clearances_precautions_question({ weeks: Math.floor(days / WEEK) });
		const threadId = await threadForDeed(tx, episodeId, context.actor);
		return after(lapsed, await insertAsk(tx, context, { episode, facts, threadId }, { kind, question }));
	});
}
