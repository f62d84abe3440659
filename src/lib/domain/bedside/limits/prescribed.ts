/**
 * An outpatient's programme prescribes a range of heart rate and exertion. In the `outpatient` set the top of the
 * range takes the place of the general ceiling: over the prescribed rate stops; over the prescribed exertion
 * cautions, and more than two points over it stops. An end that is not prescribed keeps the general ceiling. A
 * ceiling that was set for the patient as a limit stays where it is the lower of the two.
 */
import type { Prescribed } from '../forms';
import type { LimitKey } from '../codes';
import type { Limit, LimitSet } from './limits';

const EXERTION_MARGIN = 2;

/** The limits of an outpatient with the prescribed range in place. Other sets are returned as they are. */
export function withPrescribed(base: LimitSet, prescribed: Prescribed | null | undefined): LimitSet {
	if (base.set !== 'outpatient' || !prescribed) {
		return base;
	}
	const { hrMax, rpeMax } = prescribed;
	const limits = { ...base.limits };
	if (hrMax != null) {
		limits['heart-rate-ceiling'] = lowered(base, 'heart-rate-ceiling', hrMax);
	}
	if (rpeMax != null) {
		limits['exertion-ceiling'] = lowered(base, 'exertion-ceiling', rpeMax + EXERTION_MARGIN);
		limits['exertion-ceiling.caution'] = lowered(base, 'exertion-ceiling.caution', rpeMax);
	}
	return { ...base, limits };
}

function lowered(base: LimitSet, key: LimitKey, value: number): Limit | null {
	const general = base.limits[key];
	if (general === null || (general.local && general.value <= value)) {
		return general;
	}
	return {
		...general,
		value,
		source: 'range prescribed for this patient',
		version: 'prescribed',
		local: true
	};
}
