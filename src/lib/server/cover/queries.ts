import { and, eq, gt, inArray, isNull, lte } from 'drizzle-orm';
import { can } from '$lib/domain/access/can';
import type { Post } from '$lib/domain/core/codes';
import type { Reader } from '../db';
import { coverShifts, units, users, userUnits } from '../db/schema';

export interface OnCover {
	userId: string;
	name: string;
	phone: string | null;
}

/**
 * Who answers for a post on a unit at a moment. Whatever the roster says, only who could take a call there counts:
 * no disabled account, nobody who does not belong to the unit, no role that takes none. The post then has nobody.
 */
export async function onCover(db: Reader, unitId: string, post: Post, at: number): Promise<OnCover[]> {
	const rows = await answering(db, [unitId], at);
	return rows.filter((row) => row.post === post).map(({ userId, name, phone }) => ({ userId, name, phone }));
}

/** The whole cover of now, for the shell and the cover page; `until` is when the shift ends, ms UTC. */
export async function coverNow(db: Reader, unitIds: readonly string[], at: number) {
	const rows = await answering(db, unitIds, at);
	return rows.map(({ unitId, unit, post, name, until }) => ({ unitId, unit, post, name, until }));
}

async function answering(db: Reader, unitIds: readonly string[], at: number) {
	const rows = await db
		.select({
			unitId: coverShifts.unitId,
			unit: units.name,
			post: coverShifts.post,
			userId: users.id,
			name: users.name,
			role: users.role,
			phone: users.phone,
			until: coverShifts.endsAt
		})
		.from(coverShifts)
		.innerJoin(users, eq(users.id, coverShifts.userId))
		.innerJoin(userUnits, and(eq(userUnits.userId, users.id), eq(userUnits.unitId, coverShifts.unitId)))
		.innerJoin(units, eq(units.id, coverShifts.unitId))
		.where(
			and(
				inArray(coverShifts.unitId, [...unitIds]),
				lte(coverShifts.startsAt, at),
				gt(coverShifts.endsAt, at),
				isNull(users.disabledAt)
			)
		)
		.orderBy(units.name, coverShifts.post);
	return rows.filter(({ userId, name, role, unitId }) =>
		can({ kind: 'person', id: userId, name, role, unitIds: [unitId] }, 'escalation.take', { unitId })
	);
}
