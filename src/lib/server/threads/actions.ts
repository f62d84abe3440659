import type { z } from 'zod';
import { STRAND_OF_ROLE, type ClinicalRole } from '$lib/domain/core/codes';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { entryBody } from '$lib/domain/referrals/forms';
import type { EntryLine } from '$lib/domain/referrals/views';
import { accessThread } from '../access/access';
import type { PersonContext } from '../context';
import { newId } from '../ids';
import { write, type Written } from '../write';

/**
 * Say something in a thread. Any clinical role that sees the patient may, as long as the referral was not withdrawn.
 * @throws Problem `wrong-state` in a withdrawn thread
 */
export function postEntry(
	context: PersonContext,
	threadId: string,
	input: z.infer<typeof entryBody>
): Promise<Written<EntryLine>> {
	return write(context, 'entry.write', async (tx) => {
		const { thread, referral } = await accessThread(tx, context.actor, threadId, 'entry.write');
		if (referral.state === 'withdrawn') {
			throw new Problem('wrong-state', 'The referral was withdrawn; its thread takes no more entries.', {
				state: referral.state
			});
		}
		const id = newId();
		const { actor } = context;
		return {
			result: {
				id,
				// The write lock is ours, so the next number is known before the entry is tied in.
				seq: thread.lastSeq + 1,
				at: toRfc3339(context.now),
				author: { id: actor.id, name: actor.name, role: actor.role },
				strand: STRAND_OF_ROLE[actor.role as ClinicalRole],
				kind: 'note',
				body: input.body,
				ref: null
			},
			audit: {
				action: 'entry.posted',
				objectKind: 'entry',
				objectId: id,
				episodeId: thread.episodeId,
				detail: { threadId }
			},
			entries: [{ id, threadId, kind: 'note', body: input.body, mentions: input.mentions ?? [] }]
		};
	});
}
