import { SETS, type LimitKey, type SetName } from '$lib/domain/bedside/codes';
import type { RulebookLimit } from '$lib/domain/bedside/rulebook';
import { m } from '$lib/i18n/paraglide/messages';
import { withStatus } from './activity-words';
import { meaningOf } from '$lib/i18n/limit-names';
import { SET_WORDS } from '$lib/i18n/sets';

/** One limit of a rule, with its value in each set. */
export interface LimitLine {
	key: LimitKey;
	/** What crossing it means, and in what it is measured. */
	label: string;
	/** `over 10`, or that the set has it switched off. */
	values: Record<SetName, string>;
	/** Each source once; with the sets it holds for where they differ. */
	sources: string[];
	/** The versions of the limit, and in which sets its figure is our own or the unit's; told like the sources. */
	versions: string[];
	own: string[];
}

/** The limits of a rule, a line for each. */
export function limitLines(limits: readonly RulebookLimit[]): LimitLine[] {
	const keys = [...new Set(limits.map(({ key }) => key))];
	return keys.map((key) => {
		const own = limits.filter((limit) => limit.key === key);
		const unit = own.find((limit) => limit.unit !== null)?.unit ?? '';
		const valueOf = (set: SetName) => valueWords(own.find((limit) => limit.set === set));
		return {
			key,
			label: m.home_rules_limit_label({ what: meaningOf(key), unit }),
			values: Object.fromEntries(SETS.map((set) => [set, valueOf(set)])) as Record<SetName, string>,
			sources: bySet(own, sourceWords),
			versions: bySet(own, ({ version }) => version && m.home_rules_limit_version({ version })),
			own: bySet(own, ownWords)
		};
	});
}

function valueWords(limit: RulebookLimit | undefined): string {
	if (limit?.value == null || limit.when === null) {
		return m.home_rules_off();
	}
	const crossing = { over: m.home_rules_over, at: m.home_rules_at, under: m.home_rules_under }[limit.when];
	return crossing({ value: limit.value });
}

/** A source with how well it is known, in one of the four words. */
function sourceWords({ source, status }: RulebookLimit): string | null {
	return source && status && withStatus(source, status);
}

/** That nobody published the figure; null where somebody did, or the limit is off. */
function ownWords({ status, local }: RulebookLimit): string | null {
	if (local) {
		return m.home_rules_unit_figure();
	}
	return status === 'common-practice' ? m.home_rules_own_figure() : null;
}

/** What is said of a limit, each once; with the sets it is said of where that is not all that have the limit on. */
function bySet(limits: readonly RulebookLimit[], say: (limit: RulebookLimit) => string | null): string[] {
	const on = limits.filter(({ value }) => value !== null);
	const said = [...new Set(on.flatMap((limit) => say(limit) ?? []))];
	return said.map((words) => {
		const sets = on.filter((limit) => say(limit) === words);
		const names = sets.map(({ set }) => SET_WORDS[set]()).join(', ');
		return sets.length === on.length ? words : m.home_rules_source_of({ sets: names, source: words });
	});
}
