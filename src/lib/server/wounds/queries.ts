import { desc, eq } from 'drizzle-orm';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { WoundNote } from '$lib/domain/wounds/views';
import type { Reader } from '../db';
import { users, woundNotes } from '../db/schema';

/** All notes about wound and breastbone, newest first. What holds after them: `standingWound`. */
export async function listWoundNotes(db: Reader, episodeId: string): Promise<WoundNote[]> {
	const rows = await db
		.select({ noted: woundNotes, by: users.name })
		.from(woundNotes)
		.innerJoin(users, eq(users.id, woundNotes.notedBy))
		.where(eq(woundNotes.episodeId, episodeId))
		.orderBy(desc(woundNotes.notedAt), desc(woundNotes.id));
	return rows.map(({ noted: { wound, sternum, note, notedAt }, by }) => ({
		at: toRfc3339(notedAt),
		by,
		wound,
		sternum,
		note
	}));
}
