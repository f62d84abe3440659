import { eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { Person } from '$lib/domain/access/actor';
import { STRAND_OF_ROLE, type ClinicalRole } from '$lib/domain/core/codes';
import { notFound, Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { entryBody } from '$lib/domain/referrals/forms';
import type { AskedPerson, EntryLine } from '$lib/domain/referrals/views';
import { accessThread } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { entries, mentions } from '../db/schema';
import { newId } from '../ids';
import { write, type Written } from '../write';
import { askedPeople } from './people';

/**
 * Say something in a thread, or ask somebody by name. Any clinical role that sees the patient may, as long as the
 * referral was not withdrawn. Who is asked has a loose end until they answer.
 * @throws Problem `wrong-state` in a withdrawn thread, `invalid` when somebody is asked who cannot read it
 */
export function postEntry(
	context: PersonContext,
	threadId: string,
	input: z.infer<typeof entryBody>
): Promise<Written<EntryLine>> {
	return write(context, 'entry.write', async (tx) => {
		const { thread, referral, episode } = await accessThread(tx, context.actor, threadId, 'entry.write');
		if (referral.state === 'withdrawn') {
			throw new Problem('wrong-state', 'The referral was withdrawn; its thread takes no more entries.', {
				state: referral.state
			});
		}
		const asked = await mentionsOf(tx, context, episode.unitId, input.mentions ?? []);
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
				ref: null,
				asked
			},
			audit: {
				action: 'entry.posted',
				objectKind: 'entry',
				objectId: id,
				episodeId: thread.episodeId,
				detail: { threadId }
			},
			entries: [{ id, threadId, kind: 'note', body: input.body, mentions: asked }]
		};
	});
}

async function mentionsOf(
	tx: Tx,
	{ actor }: PersonContext,
	unitId: string,
	ids: readonly string[]
): Promise<AskedPerson[]> {
	const asked = await askedPeople(tx, actor, unitId, ids);
	return asked.map(({ id, name }) => ({ mentionId: newId(), id, name, open: true }));
}

/**
 * Say that a question has been seen, where no words are needed to answer it.
 * @throws Problem `not-allowed` for a question put to somebody else, `wrong-state` when it was seen before
 */
export function markSeen(context: PersonContext, mentionId: string): Promise<Written<{ id: string }>> {
	return write(context, 'thread.read', async (tx) => {
		const { mention, threadId, episodeId } = await accessMention(tx, context.actor, mentionId);
		if (mention.userId !== context.actor.id) {
			throw new Problem('not-allowed', 'This question was put to somebody else.');
		}
		if (mention.seenAt !== null) {
			throw new Problem('wrong-state', 'You have marked this question as seen already.', { state: 'seen' });
		}
		await tx.update(mentions).set({ seenAt: context.now }).where(eq(mentions.id, mentionId));
		return {
			result: { id: mentionId },
			audit: { action: 'mention.seen', objectKind: 'mention', objectId: mentionId, episodeId },
			events: [{ topic: 'thread', kind: 'mention-seen', id: threadId, episodeId }]
		};
	});
}

async function accessMention(tx: Tx, person: Person, id: string) {
	const [row] = await tx
		.select({ mention: mentions, threadId: entries.threadId })
		.from(mentions)
		.innerJoin(entries, eq(entries.id, mentions.entryId))
		.where(eq(mentions.id, id));
	if (!row) {
		throw notFound('question');
	}
	const { thread } = await accessThread(tx, person, row.threadId, 'thread.read');
	return { ...row, episodeId: thread.episodeId };
}
