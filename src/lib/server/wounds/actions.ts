import type { WoundNoteInput } from '$lib/domain/wounds/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { woundWords } from '$lib/i18n/wounds';
import { accessEpisode } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import { woundNotes } from '../db/schema';
import { newId } from '../ids';
import { write, type Written } from '../write';

/** Note what the wound looks like and how the breastbone feels. Of each part the newest note is what a decider is shown. */
export function noteWound(
	context: PersonContext,
	episodeId: string,
	input: WoundNoteInput
): Promise<Written<{ id: string }>> {
	return write(context, 'wound.note', async (tx) => {
		await accessEpisode(tx, context.actor, episodeId, 'wound.note');
		const id = newId();
		const { wound = null, sternum = null, note = null } = input;
		await tx
			.insert(woundNotes)
			.values({ id, episodeId, wound, sternum, note, notedBy: context.actor.id, notedAt: context.now });
		const threadId = await threadForDeed(tx, episodeId, context.actor);
		const body = m.wounds_entry({ words: woundWords({ wound, sternum, note }) });
		return {
			result: { id },
			audit: {
				action: 'wound.noted',
				objectKind: 'wound-note',
				objectId: id,
				episodeId,
				detail: { wound, sternum }
			},
			entries: threadId ? [{ threadId, kind: 'event', body, ref: { kind: 'wound-note', id } }] : [],
			events: [{ topic: 'episode', kind: 'wound-noted', id: episodeId, episodeId }]
		};
	});
}
