import { eq, max } from 'drizzle-orm';
import { activityByCode } from '$lib/domain/bedside/activities/activities';
import { worded } from '$lib/domain/bedside/activities/local';
import { invalidField } from '$lib/domain/core/errors';
import type { WordActivity } from '$lib/domain/limits/forms';
import type { PersonContext } from '../context';
import { unitActivityChanges } from '../db/schema';
import { newId } from '../ids';
import { write, type Written } from '../write';
import { wordingsOf } from './activities';
import { unitLimitsOf } from './queries';
import { patientsOf, refuseFutureDay, type Numbered } from './unit-actions';

/**
 * Word the dose and the lines of an activity for a unit, or with null go back to the catalogue, on the word of the
 * clinical lead. Level, energy and clearances stay.
 */
export function wordActivity(
	context: PersonContext,
	unitId: string,
	{ code, lines, agreedBy, agreedOn }: WordActivity
): Promise<Written<Numbered>> {
	return write(context, 'limit.change', async (tx) => {
		await unitLimitsOf(tx, unitId);
		refuseFutureDay(agreedOn, context.now);
		const now = worded(activityByCode(code), await wordingsOf(tx, unitId));
		if (lines === null && now.local === null) {
			throw invalidField('/lines', 'lines is null: the catalogue speaks for this activity already.');
		}
		const [last] = await tx
			.select({ version: max(unitActivityChanges.version) })
			.from(unitActivityChanges)
			.where(eq(unitActivityChanges.unitId, unitId));
		const [id, version] = [newId(), (last?.version ?? 0) + 1];
		const by = { agreedBy, agreedOn, changedBy: context.actor.id, changedAt: context.now };
		await tx.insert(unitActivityChanges).values({ id, unitId, version, code, lines, ...by });
		const detail = { code, version, reset: lines === null };
		return {
			result: { id, version },
			audit: { action: 'unit.activity-worded', objectKind: 'unit', objectId: unitId, detail },
			events: await patientsOf(tx, unitId)
		};
	});
}
