import { and, desc, eq, lte } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import type { PrescribedRange } from '$lib/domain/bedside/limits/prescribed';
import { toRfc3339 } from '$lib/domain/core/instant';
import { localDateOf } from '$lib/domain/core/time';
import type { RangeLine } from '$lib/domain/limits/views';
import { accessEpisode } from '../access/access';
import type { Reader } from '../db';
import { prescribedRanges, users } from '../db/schema';
import { env } from '../env';

/** The range prescribed for a patient as it held at an instant; null where there was none or it was ended. */
export async function rangeAt(db: Reader, episodeId: string, at: number): Promise<PrescribedRange | null> {
	const [row] = await db
		.select({ range: prescribedRanges, by: users.name })
		.from(prescribedRanges)
		.innerJoin(users, eq(users.id, prescribedRanges.prescribedBy))
		.where(and(eq(prescribedRanges.episodeId, episodeId), lte(prescribedRanges.prescribedAt, at)))
		.orderBy(desc(prescribedRanges.version))
		.limit(1);
	if (!row || row.range.method === null) {
		return null;
	}
	const { version, hrMin, hrMax, rpeMin, rpeMax, method, prescribedAt } = row.range;
	const prescribedOn = localDateOf(prescribedAt, env().hospital.zone);
	return { version, hrMin, hrMax, rpeMin, rpeMax, method, prescribedBy: row.by, prescribedOn };
}

/** Every range that was prescribed for a patient, newest first. */
export async function rangesOf(db: Reader, person: Person, episodeId: string): Promise<RangeLine[]> {
	await accessEpisode(db, person, episodeId, 'session.read');
	const rows = await db
		.select({ range: prescribedRanges, by: users.name })
		.from(prescribedRanges)
		.innerJoin(users, eq(users.id, prescribedRanges.prescribedBy))
		.where(eq(prescribedRanges.episodeId, episodeId))
		.orderBy(desc(prescribedRanges.version));
	return rows.map(({ range: { episodeId: _episode, prescribedAt, ...range }, by }, index) => ({
		...range,
		prescribedBy: by,
		prescribedAt: toRfc3339(prescribedAt),
		inForce: index === 0 && range.method !== null
	}));
}
