import { eq, max } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import type { PrescribeRange } from '$lib/domain/limits/forms';
import { rangeWords } from '$lib/i18n/ranges';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { prescribedRanges } from '../db/schema';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';
import { rangeAt } from './ranges';
import type { Numbered } from './unit-actions';

type Row = Omit<
	typeof prescribedRanges.$inferInsert,
	'id' | 'episodeId' | 'version' | 'prescribedBy' | 'prescribedAt'
>;

const NOTHING: Row = { hrMin: null, hrMax: null, rpeMin: null, rpeMax: null, method: null, note: null };

/**
 * Prescribe the range of heart rate and exertion that judges an outpatient's sessions from now on, with how it was
 * found. The ranges before it stay on record.
 * @throws Problem `wrong-state` in hospital, where the range would judge nothing
 */
export function prescribeRange(
	context: PersonContext,
	episodeId: string,
	input: PrescribeRange
): Promise<Written<Numbered>> {
	return write(context, 'range.prescribe', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'range.prescribe');
		if (episode.closedAt !== null || episode.phase !== 'outpatient') {
			const state = episode.closedAt === null ? episode.phase : 'closed';
			throw new Problem('wrong-state', m.limits_range_not_here(), { state });
		}
		const words = m.limits_entry_range({ range: rangeWords(input) });
		return insert(tx, context, episodeId, { ...NOTHING, ...input }, words);
	});
}

/** End the range: the general ceilings of outpatients hold again. */
export function endRange(context: PersonContext, episodeId: string): Promise<Written<Numbered>> {
	return write(context, 'range.prescribe', async (tx) => {
		await accessEpisode(tx, context.actor, episodeId, 'range.prescribe');
		if ((await rangeAt(tx, episodeId, context.now)) === null) {
			throw new Problem('wrong-state', m.limits_range_none(), { state: 'ended' });
		}
		return insert(tx, context, episodeId, NOTHING, m.limits_entry_range_ended());
	});
}

async function insert(
	tx: Tx,
	context: PersonContext,
	episodeId: string,
	row: Row,
	body: string
): Promise<Change<Numbered>> {
	const [last] = await tx
		.select({ version: max(prescribedRanges.version) })
		.from(prescribedRanges)
		.where(eq(prescribedRanges.episodeId, episodeId));
	const [id, version] = [newId(), (last?.version ?? 0) + 1];
	const by = { prescribedBy: context.actor.id, prescribedAt: context.now };
	await tx.insert(prescribedRanges).values({ id, episodeId, version, ...row, ...by });
	const threadId = await threadForDeed(tx, episodeId, context.actor);
	const { note: _note, ...figures } = row;
	return {
		result: { id, version },
		audit: {
			action: row.method === null ? 'range.ended' : 'range.prescribed',
			objectKind: 'range',
			objectId: id,
			episodeId,
			detail: { ...figures, version }
		},
		entries: threadId === null ? [] : [{ threadId, kind: 'event', body }],
		events: [{ topic: 'episode', kind: 'range-prescribed', id: episodeId, episodeId }]
	};
}
