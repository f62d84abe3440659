/**
 * The layers of limits: the default table, the unit's changes on top, the patient's on top of those. Each limit
 * says which layer it is from and in which version, so that a finding can be explained years later.
 */
import type { LimitKey, SetName } from '../codes';
import { plain } from '../numbers';
import {
	layLimits,
	limitsFor,
	overrideLimits,
	type Limit,
	type LimitSet,
	type LocalLimit,
	type LocalLimits
} from './limits';
import { withRange, type PrescribedRange } from './prescribed';
import { DEFAULT_LIMITS } from './table';

/** A change that a unit made; without a key it chooses the set that judges the unit's inpatients. */
export interface UnitChange {
	readonly version: number;
	readonly set: SetName;
	readonly key: LimitKey | null;
	/** Null goes back to the default. */
	readonly value: number | null;
	/** The clinical lead who answers for it. */
	readonly agreedBy: string;
	/** `YYYY-MM-DD` */
	readonly agreedOn: string;
}

/** A limit of one patient that is in force. */
export interface PatientLimit {
	readonly version: number;
	readonly key: LimitKey;
	readonly value: number;
	readonly setBy: string;
	/** The last day on which it holds, `YYYY-MM-DD`. */
	readonly untilOn: string;
}

/** What is laid over the defaults for one patient. Plain data: it travels with the nameboard. */
export interface LocalLayers {
	readonly unit: readonly UnitChange[];
	readonly patient: readonly PatientLimit[];
	/** The range prescribed for an outpatient; null or left out where there is none. */
	readonly prescribed?: PrescribedRange | null;
}

export const NO_LAYERS: LocalLayers = { unit: [], patient: [] };

/** The set that judges where a session names none: the outpatient one, or what the unit chose for inpatients. */
export function setOfUnit(unit: readonly UnitChange[], phase: 'inpatient' | 'outpatient'): SetName {
	return phase === 'outpatient'
		? 'outpatient'
		: (newest(unit.filter(({ key }) => key === null))?.set ?? 'strict');
}

/** The limits of a set with a unit's changes. */
export function limitsOfUnit(set: SetName, unit: readonly UnitChange[]): LimitSet {
	const held = inForce(unit.filter((change) => change.set === set && change.key !== null));
	const changed: LocalLimits = Object.fromEntries(
		held.flatMap(({ key, value, agreedBy, agreedOn, version }) => {
			const source = `set by the unit: ${agreedBy}, ${agreedOn} (${wasDefault(set, key)})`;
			return key === null || value === null ? [] : [[key, { value, source, version: `unit ${version}` }]];
		})
	);
	const base = limitsFor(set);
	return layLimits(base, withDrug(base, changed), `unit ${newest(unit)?.version ?? 0}`);
}

/**
 * A unit that widens the rise of the heart rate has said nothing about patients on a rate-slowing drug; one that
 * narrows it below theirs has, and so has one that switches the rule on.
 */
function withDrug(base: LimitSet, changed: LocalLimits): LocalLimits {
	const rise = changed['heart-rate-rise'];
	const theirs = base.limits['heart-rate-rise.beta-blocked'];
	if (rise === undefined || changed['heart-rate-rise.beta-blocked'] !== undefined) {
		return changed;
	}
	return theirs === null || valueOf(rise) < theirs.value
		? { ...changed, 'heart-rate-rise.beta-blocked': rise }
		: changed;
}

function valueOf(limit: LocalLimit): number {
	return typeof limit === 'number' ? limit : limit.value;
}

/** The limits that judge one patient: the set, the unit's changes, the patient's own, an outpatient's range. */
export function limitsOfPatient(set: SetName, { unit, patient, prescribed = null }: LocalLayers): LimitSet {
	const base = limitsOfUnit(set, unit);
	const own: LocalLimits = Object.fromEntries(
		inForce(patient).map(({ key, value, setBy, untilOn, version }) => [
			key,
			{
				value,
				source: `set for this patient by ${setBy} until ${untilOn} (${otherwise(base.limits[key])})`,
				version: `patient ${version}`
			}
		])
	);
	return withRange(overrideLimits(base, own, `patient ${newest(patient)?.version ?? 0}`), prescribed);
}

/** Whether a number makes a limit narrower or wider than it was; null where the two are the same. */
export function directionOf(was: Pick<Limit, 'value' | 'when'>, value: number): 'narrower' | 'wider' | null {
	if (was.value === value) {
		return null;
	}
	return (was.when === 'under' ? value > was.value : value < was.value) ? 'narrower' : 'wider';
}

/** The newest of each set and key, the oldest change first. */
function inForce<T extends { version: number; key: LimitKey | null; set?: SetName }>(
	changes: readonly T[]
): T[] {
	const byKey = new Map<string, T>();
	for (const change of [...changes].sort((a, b) => a.version - b.version)) {
		byKey.set(`${change.set ?? ''} ${change.key ?? ''}`, change);
	}
	return [...byKey.values()];
}

function newest<T extends { version: number }>(changes: readonly T[]): T | null {
	return changes.reduce<T | null>((last, each) => (last && last.version > each.version ? last : each), null);
}

function wasDefault(set: SetName, key: LimitKey | null): string {
	const limit = key && DEFAULT_LIMITS[set][key];
	return limit ? `default ${plain(limit.value)}` : 'off by default';
}

function otherwise(limit: Limit | null): string {
	return limit ? `otherwise ${plain(limit.value)}` : 'otherwise off';
}
