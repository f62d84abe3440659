import { eq, sql } from 'drizzle-orm';
import { personOf } from '$lib/domain/access/actor';
import { STRAND_OF_ROLE, type ClinicalRole, type Strand } from '$lib/domain/core/codes';
import type { LiveEvent } from '$lib/domain/live/events';
import type { EntryKind, RefKind } from '$lib/domain/referrals/entries';
import type { Context } from '../context';
import type { Tx } from '../db';
import { entries, mentions, threads } from '../db/schema';
import { newId } from '../ids';

export interface NewEntry {
	id?: string;
	threadId: string;
	kind: EntryKind;
	body: string;
	ref?: { kind: RefKind; id: string };
	/** Whom it asks: the identifier of the question, and of the person. */
	mentions?: readonly { mentionId: string; id: string }[];
	/** Taken from the author's role when left out; the system names the strand it speaks for. */
	strand?: Strand;
}

/**
 * Tie entries into their threads. Numbers run without gaps for each thread, because they are given here, inside
 * the one write transaction. Answers one live event for each entry.
 */
export async function appendEntries(tx: Tx, context: Context, added: NewEntry[]): Promise<LiveEvent[]> {
	const events: LiveEvent[] = [];
	const author = context.actor && personOf(context.actor);
	for (const entry of added) {
		const [thread] = await tx
			.update(threads)
			.set({ lastSeq: sql`${threads.lastSeq} + 1` })
			.where(eq(threads.id, entry.threadId))
			.returning({ seq: threads.lastSeq, episodeId: threads.episodeId });
		if (!thread) {
			throw new Error(`Thread ${entry.threadId} is missing: the work named a thread that does not exist.`);
		}
		const id = entry.id ?? newId();
		const asked = entry.mentions ?? [];
		await tx.insert(entries).values({
			id,
			threadId: entry.threadId,
			seq: thread.seq,
			at: context.now,
			authorId: author?.id ?? null,
			strand: entry.strand ?? strandOf(context),
			kind: entry.kind,
			body: entry.body,
			refKind: entry.ref?.kind ?? null,
			refId: entry.ref?.id ?? null,
			mentions: asked.map((person) => person.id)
		});
		for (const { mentionId, id: userId } of asked) {
			await tx.insert(mentions).values({ id: mentionId, entryId: id, userId });
		}
		events.push({ topic: 'thread', kind: 'entry', id: entry.threadId, episodeId: thread.episodeId });
	}
	return events;
}

function strandOf(context: Context): Strand {
	if (context.actor?.kind === 'patient') {
		return 'patient';
	}
	const role = context.actor && personOf(context.actor)?.role;
	// A coordinator's deed (a booking) stands with the patient's strand; clinical roles have their own.
	return role && role in STRAND_OF_ROLE ? STRAND_OF_ROLE[role as ClinicalRole] : 'patient';
}
