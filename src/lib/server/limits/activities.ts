import { asc, eq } from 'drizzle-orm';
import { activitiesOf, type LocalActivity, type UnitActivity } from '$lib/domain/bedside/activities/local';
import { notFound } from '$lib/domain/core/errors';
import type { Reader } from '../db';
import { unitActivityChanges, units } from '../db/schema';

/**
 * The catalogue of activities; of a unit with the words it chose.
 * @throws Problem `not-found` for a unit that is not there
 */
export async function listActivities(db: Reader, unitId: string | null): Promise<UnitActivity[]> {
	if (unitId === null) {
		return activitiesOf([]);
	}
	if ((await db.$count(units, eq(units.id, unitId))) === 0) {
		throw notFound('unit');
	}
	return activitiesOf(await wordingsOf(db, unitId));
}

/** Every wording of a unit, oldest first. */
export async function wordingsOf(db: Reader, unitId: string): Promise<LocalActivity[]> {
	const { code, lines, version, agreedBy, agreedOn } = unitActivityChanges;
	return db
		.select({ code, lines, version, agreedBy, agreedOn })
		.from(unitActivityChanges)
		.where(eq(unitActivityChanges.unitId, unitId))
		.orderBy(asc(version));
}
