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
	/** Its title without its standing, which `status` gives. */
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
	readonly sources: readonly NamedSource[];
	/** Of these, what it rests on for all it says without a number. */
	readonly unnumbered: readonly NamedSource[];
}

type NamedSource = Source & { readonly id: SourceId };

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
				sources: sourcesOf(keys, sources),
				unnumbered: sourcesOf([], sources).filter(({ id }) => !citedBy(keys).includes(id))
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
	const { value, when, unit, version, local } = limit;
	// Whatever a default rests on, the figure that a unit puts in its place is the unit's own.
	const id = local ? undefined : DEFAULT_LIMITS[set][key]?.source;
	const { title: source, status } = id ? SOURCES[id] : { ...SOURCES['common-practice'], title: limit.source };
	return { key, set, value, when, unit, source, status, version, local };
}

function sourcesOf(keys: readonly LimitKey[], own: readonly SourceId[]): RulebookRow['sources'] {
	return [...new Set([...own, ...citedBy(keys)])].map((id) => ({ id, ...SOURCES[id] }));
}

function citedBy(keys: readonly LimitKey[]): SourceId[] {
	const all = keys.flatMap((key) => SETS.map((set) => DEFAULT_LIMITS[set][key]?.source));
	return all.filter((id) => id !== undefined);
}
