/**
 * The response rules as a list to read: what the page 'Rules and sources' shows and what the clinical document is
 * made from. Taken from the same registry and the same tables that judge, so that it cannot tell another story.
 */
import { LIMIT_KEYS, SETS, type LimitKey, type RuleId, type SetName } from './codes';
import { limitsFor, type LimitSet } from './limits/limits';
import { SOURCES, type Source, type SourceId, type SourceStatus } from './limits/sources';
import { DEFAULT_LIMITS, type Crossing } from './limits/table';
import { RULES } from './rules/registry';

/** One limit as one set has it. */
export interface RulebookLimit {
	readonly key: LimitKey;
	readonly set: SetName;
	/** Null where the set has the limit switched off. */
	readonly value: number | null;
	readonly when: Crossing | null;
	readonly unit: string | null;
	readonly source: string | null;
	/** How well that source is known; `common-practice` is a figure of our own, or of the unit. Null where it is off. */
	readonly status: SourceStatus | null;
	readonly version: string | null;
	/** Changed by the unit. */
	readonly local: boolean;
}

export interface RulebookRow {
	readonly rule: RuleId;
	readonly words: string;
	/** In the order of the sets; empty for a rule without numbers. */
	readonly limits: readonly RulebookLimit[];
	/** Every source the rule rests on by default, each once. */
	readonly sources: readonly (Source & { readonly id: SourceId })[];
}

export interface Rulebook {
	readonly version: string;
	readonly rows: readonly RulebookRow[];
}

/** All rules with their limits in each set. `sets` are those of a unit; without them the defaults. */
export function rulebook(sets: Readonly<Partial<Record<SetName, LimitSet>>> = {}): Rulebook {
	const resolved = SETS.map((set) => sets[set] ?? limitsFor(set));
	return {
		version: resolved.map(({ version }) => version).join(', '),
		rows: RULES.map(({ id, words, sources }) => {
			const keys = keysOf(id);
			return {
				rule: id,
				words,
				limits: keys.flatMap((key) => resolved.map((set) => limitRow(key, set))),
				sources: sourcesOf(keys, sources)
			};
		})
	};
}

/** The limits of a rule: its own name, and its name with a suffix. */
export function keysOf(rule: RuleId): LimitKey[] {
	return LIMIT_KEYS.filter((key) => key === rule || key.startsWith(`${rule}.`));
}

function limitRow(key: LimitKey, { set, limits }: LimitSet): RulebookLimit {
	const limit = limits[key];
	if (limit === null) {
		return {
			key,
			set,
			value: null,
			when: null,
			unit: null,
			source: null,
			status: null,
			version: null,
			local: false
		};
	}
	const { value, when, unit, source, version, local } = limit;
	return { key, set, value, when, unit, source, status: statusOf(key, set, local), version, local };
}

/** Whatever a default rests on, the figure that a unit puts in its place is the unit's own. */
function statusOf(key: LimitKey, set: SetName, local: boolean): SourceStatus {
	const source = local ? undefined : DEFAULT_LIMITS[set][key]?.source;
	return source === undefined ? 'common-practice' : SOURCES[source].status;
}

function sourcesOf(keys: readonly LimitKey[], own: readonly SourceId[]): RulebookRow['sources'] {
	const ofLimits = keys.flatMap((key) => SETS.map((set) => DEFAULT_LIMITS[set][key]?.source));
	const ids = new Set([...own, ...ofLimits].filter((id) => id !== undefined));
	return [...ids].map((id) => ({ id, ...SOURCES[id] }));
}
