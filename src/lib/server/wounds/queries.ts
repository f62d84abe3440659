import { desc, eq } from 'drizzle-orm';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { WoundNote } from '$lib/domain/wounds/views';
import type { Reader } from '../db';
import { users, woundNotes } from '../db/schema';

/** The newest note about wound and breastbone; null when nobody has noted anything. */
export async function newestWoundNote(db: Reader, episodeId: string): Promise<WoundNote | null> {
	const [newest = null] = await listWoundNotes(db, episodeId, 1);
	return newest;
}

/** The newest notes about wound and breastbone, newest first. */
export async function listWoundNotes(db: Reader, episodeId: string, limit: number): Promise<WoundNote[]> {
	const rows = await db
		.select({ noted: woundNotes, by: users.name })
		.from(woundNotes)
		.innerJoin(users, eq(users.id, woundNotes.notedBy))
		.where(eq(woundNotes.episodeId, episodeId))
		.orderBy(desc(woundNotes.notedAt), desc(woundNotes.id))
		.limit(limit);
	return rows.map(({ noted: { wound, sternum, note, notedAt }, by }) => ({
		at: toRfc3339(notedAt),
		by,
		wound,
		sternum,
		note
	}));
}
