import { and, eq, isNull, max } from 'drizzle-orm';
import type { LimitKey, SetName } from '$lib/domain/bedside/codes';
import { limitsOfUnit, setOfUnit } from '$lib/domain/bedside/limits/layers';
import { limitFault } from '$lib/domain/bedside/limits/ranges';
import { invalidField } from '$lib/domain/core/errors';
import { localDateOf } from '$lib/domain/core/time';
import type { ChangeUnitLimit, ChooseUnitSet } from '$lib/domain/limits/forms';
import type { LiveEvent } from '$lib/domain/live/events';
import { longDay } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';
import { SET_WORDS } from '$lib/i18n/sets';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { episodes, unitLimitChanges } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';
import { unitLimitsOf } from './queries';

export interface Numbered {
	id: string;
	/** The number of the change, which findings name. */
	version: number;
}

/**
 * Change a limit for all patients of a unit, or with null go back to the default, on the word of the clinical lead.
 * @throws Problem `invalid` for a number out of range, one that holds already, or a day that has not come yet
 */
export function changeUnitLimit(
	context: PersonContext,
	unitId: string,
	input: ChangeUnitLimit
): Promise<Written<Numbered>> {
	return write(context, 'limit.change', async (tx) => {
		const { changes } = await unitLimitsOf(tx, unitId);
		refuseFutureDay(input.agreedOn, context.now);
		const { set, key, value } = input;
		const fault = value === null ? null : limitFault(key, value);
		if (fault !== null) {
			throw invalidField('/value', fault);
		}
		const holds = limitsOfUnit(set, changes).limits[key];
		if (value === null ? holds?.local !== true : holds?.value === value) {
			const same = value === null ? m.limits_problem_default() : m.limits_problem_holds({ value });
			throw invalidField('/value', same);
		}
		const detail = { set, key, value, was: holds?.value ?? null };
		return changed(tx, context, unitId, input, 'unit.limit-changed', detail);
	});
}

/** Choose the set of limits that judges the unit's inpatients. */
export function chooseUnitSet(
	context: PersonContext,
	unitId: string,
	input: ChooseUnitSet
): Promise<Written<Numbered>> {
	return write(context, 'limit.change', async (tx) => {
		const { changes } = await unitLimitsOf(tx, unitId);
		refuseFutureDay(input.agreedOn, context.now);
		const was = setOfUnit(changes, 'inpatient');
		if (was === input.set) {
			throw invalidField('/set', m.limits_problem_set({ set: SET_WORDS[was]() }));
		}
		return changed(tx, context, unitId, input, 'unit.limit-set-chosen', { set: input.set, was });
	});
}

interface NewChange {
	set: SetName;
	key?: LimitKey;
	value?: number | null;
	agreedBy: string;
	agreedOn: string;
}

async function changed(
	tx: Tx,
	context: PersonContext,
	unitId: string,
	{ set, key = undefined, value = null, agreedBy, agreedOn }: NewChange,
	action: 'unit.limit-changed' | 'unit.limit-set-chosen',
	detail: Record<string, string | number | null>
): Promise<Change<Numbered>> {
	const [last] = await tx
		.select({ version: max(unitLimitChanges.version) })
		.from(unitLimitChanges)
		.where(eq(unitLimitChanges.unitId, unitId));
	const [id, version] = [newId(), (last?.version ?? 0) + 1];
	const by = { agreedBy, agreedOn, changedBy: context.actor.id, changedAt: context.now };
	await tx.insert(unitLimitChanges).values({ id, unitId, version, set, key: key ?? null, value, ...by });
	return {
		result: { id, version },
		audit: { action, objectKind: 'unit', objectId: unitId, detail: { ...detail, version } },
		events: await patientsOf(tx, unitId)
	};
}

/** Whoever has a patient of the unit open is judging by limits that no longer hold. */
export async function patientsOf(tx: Tx, unitId: string): Promise<LiveEvent[]> {
	const open = await tx
		.select({ id: episodes.id })
		.from(episodes)
		.where(and(eq(episodes.unitId, unitId), isNull(episodes.closedAt)));
	return open.map(({ id }) => ({ topic: 'episode', kind: 'limits-changed', id, episodeId: id }));
}

/** What was agreed was agreed on a day that has come. */
export function refuseFutureDay(agreedOn: string, now: number): void {
	const today = localDateOf(now, env().hospital.zone);
	if (agreedOn > today) {
		throw invalidField(
			'/agreedOn',
			m.limits_problem_agreed({ day: longDay(agreedOn), today: longDay(today) })
		);
	}
}
