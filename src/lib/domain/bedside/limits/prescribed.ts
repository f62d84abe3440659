/**
 * An outpatient's programme prescribes a range of heart rate and exertion. In the `outpatient` set the top of the
 * range takes the place of the general ceiling: over the prescribed rate stops; over the prescribed exertion
 * cautions, and more than two points over it stops. An end that is not prescribed keeps the general ceiling. A
 * ceiling that was set for the patient as a limit stays where it is the lower of the two.
 */
import type { Prescribed } from '../forms';
import type { LimitKey } from '../codes';
import { isPatientsOwn, type Limit, type LimitSet } from './limits';

const EXERTION_MARGIN = 2;

/** Where the top of a prescribed range comes from. */
export const PRESCRIBING_METHODS = [
	'exercise-test',
	'walk-test',
	'220-age',
	'208-0.7age',
	'164-0.7age',
	'rest-plus',
	'exertion-alone',
	'other'
] as const;
export type PrescribingMethod = (typeof PRESCRIBING_METHODS)[number];

/** A range that is on record for one patient. */
export interface PrescribedRange {
	/** Counts the ranges of the stay; findings name it. */
	readonly version: number;
	readonly hrMin: number | null;
	readonly hrMax: number | null;
	readonly rpeMin: number | null;
	readonly rpeMax: number | null;
	readonly method: PrescribingMethod;
	readonly prescribedBy: string;
	/** `YYYY-MM-DD` */
	readonly prescribedOn: string;
}

/** The limits with a range on record in place: each says whose range it is, by which method, and which version. */
export function withRange(base: LimitSet, range: PrescribedRange | null): LimitSet {
	if (range === null || base.set !== 'outpatient') {
		return base;
	}
	const { version, method, prescribedBy, prescribedOn } = range;
	const source = `range prescribed for this patient by ${prescribedBy}, ${prescribedOn} (${method})`;
	const named = `prescribed ${version}`;
	const ranged = withPrescribed(base, range, { source, version: named });
	return { ...ranged, version: `${base.version}+${named}` };
}

const UNNAMED = { source: 'range prescribed for this patient', version: 'prescribed' };

/** The limits of an outpatient with the prescribed range in place. Other sets are returned as they are. */
export function withPrescribed(
	base: LimitSet,
	prescribed: Prescribed | null | undefined,
	from: Pick<Limit, 'source' | 'version'> = UNNAMED
): LimitSet {
	if (base.set !== 'outpatient' || !prescribed) {
		return base;
	}
	const { hrMax, rpeMax } = prescribed;
	const limits = { ...base.limits };
	if (hrMax != null) {
		limits['heart-rate-ceiling'] = lowered(base, 'heart-rate-ceiling', hrMax, from);
	}
	if (rpeMax != null) {
		limits['exertion-ceiling'] = lowered(base, 'exertion-ceiling', rpeMax + EXERTION_MARGIN, from);
		limits['exertion-ceiling.caution'] = lowered(base, 'exertion-ceiling.caution', rpeMax, from);
	}
	return { ...base, limits };
}

function lowered(
	base: LimitSet,
	key: LimitKey,
	value: number,
	from: Pick<Limit, 'source' | 'version'>
): Limit | null {
	const general = base.limits[key];
	if (general === null || (isPatientsOwn(general) && general.value <= value)) {
		return general;
	}
	return { ...general, ...from, value, local: true };
}
