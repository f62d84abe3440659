import { and, eq, gt, isNull, lte } from 'drizzle-orm';
import type { Post } from '$lib/domain/core/codes';
import type { Reader } from '../db';
import { coverShifts, units, users } from '../db/schema';

export interface OnCover {
	userId: string;
	name: string;
	phone: string | null;
}

/** Who answers for a post on a unit at a moment. Disabled accounts never count, whatever the roster says. */
export async function onCover(db: Reader, unitId: string, post: Post, at: number): Promise<OnCover[]> {
	return db
		.select({ userId: users.id, name: users.name, phone: users.phone })
		.from(coverShifts)
		.innerJoin(users, eq(users.id, coverShifts.userId))
		.where(
			and(
				eq(coverShifts.unitId, unitId),
				eq(coverShifts.post, post),
				lte(coverShifts.startsAt, at),
				gt(coverShifts.endsAt, at),
				isNull(users.disabledAt)
			)
		);
}

/** The whole cover of now, for the shell and the cover page; `until` is when the shift ends, ms UTC. */
export async function coverNow(db: Reader, unitIds: readonly string[], at: number) {
	const rows = await db
		.select({
			unitId: coverShifts.unitId,
			unit: units.name,
			post: coverShifts.post,
			name: users.name,
			until: coverShifts.endsAt
		})
		.from(coverShifts)
		.innerJoin(users, eq(users.id, coverShifts.userId))
		.innerJoin(units, eq(units.id, coverShifts.unitId))
		.where(and(lte(coverShifts.startsAt, at), gt(coverShifts.endsAt, at), isNull(users.disabledAt)))
		.orderBy(units.name, coverShifts.post);
	return rows.filter((row) => unitIds.includes(row.unitId));
}
