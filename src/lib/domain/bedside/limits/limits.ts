/**
 * From the default table to the limits that judge one session. A unit changes a default, a physician changes it
 * again for one patient; each limit then says that it was set locally and what the default was. Two things hold
 * whatever is changed: nobody may start above what would stop them at once, and a limit for patients on a
 * rate-slowing drug follows the limit of its rule unless it is given itself.
 */
import type { Context } from '../forms';
import { LIMIT_KEYS, type LimitKey, type SetName } from '../codes';
import { exact, plain } from '../numbers';
import { cite } from './sources';
import { CAUTION_SHARE, DEFAULT_LIMITS, DEFAULTS_VERSION, type Crossing, type DefaultLimit } from './table';

/** A limit as a rule uses it. */
export interface Limit {
	readonly value: number;
	readonly when: Crossing;
	readonly unit: string;
	readonly source: string;
	readonly version: string;
	/** Changed by a unit or for a patient. */
	readonly local: boolean;
}

/** All the limits of one set, resolved. */
export interface LimitSet {
	readonly set: SetName;
	readonly version: string;
	readonly cautionShare: number | null;
	readonly limits: Readonly<Record<LimitKey, Limit | null>>;
}

/** A changed limit: the number alone, or with where it came from and which version of the change it is. */
export type LocalLimit = number | { value: number; source?: string; version?: string };
export type LocalLimits = Readonly<Partial<Record<LimitKey, LocalLimit>>>;

/** What `before` may not exceed, beside what stops in effort. */
const START_LIMITS = [
	['systolic-ceiling.before', 'systolic-ceiling'],
	['diastolic-ceiling.before', 'diastolic-ceiling'],
	['heart-rate-ceiling.before', 'heart-rate-ceiling'],
	['respiratory-ceiling.before', 'respiratory-ceiling']
] as const satisfies readonly (readonly [LimitKey, LimitKey])[];

/** The set that judges where none is stated: `outpatient` in the outpatient phase, `strict` otherwise. */
export function setFor(context: Pick<Context, 'set' | 'phase'>): SetName {
	return context.set ?? (context.phase === 'outpatient' ? 'outpatient' : 'strict');
}

/** The limits of a set with those of a unit in place of its defaults. */
export function limitsFor(set: SetName, overrides: LocalLimits = {}): LimitSet {
	const defaults = DEFAULT_LIMITS[set];
	const limits = Object.fromEntries(
		LIMIT_KEYS.map((key) => [key, defaults[key] && fromDefault(defaults[key])])
	) as Record<LimitKey, Limit | null>;
	const resolved = { set, version: `${set}/${DEFAULTS_VERSION}`, cautionShare: CAUTION_SHARE[set], limits };
	return overrideLimits(resolved, overrides);
}

/**
 * The same limits with some of them changed once more.
 * @param layer what the version of the set is marked with: whose change it was, and which
 */
export function overrideLimits(base: LimitSet, overrides: LocalLimits, layer = 'local'): LimitSet {
	return layLimits(base, withFollowers(overrides), layer);
}

/** The same, each limit by its own name alone: none follows another. */
export function layLimits(base: LimitSet, changes: LocalLimits, layer: string): LimitSet {
	const keys = LIMIT_KEYS.filter((key) => changes[key] !== undefined);
	if (keys.length === 0) {
		return base;
	}
	const limits = { ...base.limits };
	for (const key of keys) {
		limits[key] = changed(base, key, changes[key]);
	}
	tighten(limits, keys);
	const version = base.version.endsWith(`+${layer}`) ? base.version : `${base.version}+${layer}`;
	return { ...base, version, limits };
}

/** Whether somebody set it for this one patient, or with this session: a unit's change is for all of its patients. */
export function isPatientsOwn({ local, version }: Pick<Limit, 'local' | 'version'>): boolean {
	return local && !version.startsWith('unit ');
}

/** True when the measured value crosses the limit. Both sides are freed of binary noise first. */
export function crosses(limit: Pick<Limit, 'value' | 'when'>, measured: number): boolean {
	const [value, bar] = [exact(measured), exact(limit.value)];
	if (limit.when === 'over') {
		return value > bar;
	}
	return limit.when === 'at' ? value >= bar : value < bar;
}

function fromDefault({ value, when, unit, source }: DefaultLimit): Limit {
	return { value, when, unit, source: cite(source), version: DEFAULTS_VERSION, local: false };
}

/** A physician who sets the rise of the heart rate for a patient means it for that patient, drug or no drug. */
function withFollowers(overrides: LocalLimits): LocalLimits {
	const rise = overrides['heart-rate-rise'];
	return rise === undefined ? overrides : { 'heart-rate-rise.beta-blocked': rise, ...overrides };
}

function changed(base: LimitSet, key: LimitKey, local: LocalLimit | undefined): Limit | null {
	const before = base.limits[key];
	// A rule that is off in this set is switched on with the crossing and the unit it has where it is on.
	const shape = before ?? DEFAULT_LIMITS.strict[key];
	if (local === undefined || shape === null) {
		return before;
	}
	const { value, source, version } = typeof local === 'number' ? { value: local } : local;
	const otherwise = before === null ? 'off by default' : `default ${plain(before.value)}: ${before.source}`;
	return {
		value,
		when: shape.when,
		unit: shape.unit,
		source: source ?? `limit set locally (${otherwise})`,
		version: version ?? 'local',
		local: true
	};
}

function tighten(limits: Record<LimitKey, Limit | null>, changedKeys: readonly LimitKey[]): void {
	for (const [start, effort] of START_LIMITS) {
		const [mayStart, mustStop] = [limits[start], limits[effort]];
		const touched = changedKeys.includes(start) || changedKeys.includes(effort);
		if (touched && mayStart && mustStop && mustStop.value < mayStart.value) {
			limits[start] = mustStop;
		}
	}
}
