import type { LineKind } from '../domain/lines/codes';
import type { StandingOxygen } from '../domain/lines/views';
import { m } from './paraglide/messages';

export const LINE_WORDS: Record<LineKind, () => string> = {
	'endotracheal-tube': m.lines_kind_endotracheal_tube,
	'arterial-line': m.lines_kind_arterial_line,
	'central-line': m.lines_kind_central_line,
	'peripheral-line': m.lines_kind_peripheral_line,
	'chest-drain': m.lines_kind_chest_drain,
	'pacing-wires': m.lines_kind_pacing_wires,
	'urinary-catheter': m.lines_kind_urinary_catheter
};

/** What is in, in one line: `chest drain, pacing wires`; empty where nothing is. */
export function linesWords(lines: readonly LineKind[]): string {
	return lines.map((kind) => LINE_WORDS[kind]()).join(', ');
}

/** `oxygen 2 L/min` or `no oxygen`; where nobody has said either, that it is not known, as it is said of the drug. */
export function oxygenWords(oxygen: Pick<StandingOxygen, 'lpm'> | null): string {
	if (oxygen === null) {
		return m.lines_oxygen_unknown();
	}
	return oxygen.lpm === 0 ? m.lines_oxygen_none() : m.lines_oxygen_flow({ lpm: oxygen.lpm });
}

/** The same beside the term: `2 L/min`, `none` or `not known`. */
export function oxygenFact(oxygen: Pick<StandingOxygen, 'lpm'> | null): string {
	if (oxygen === null) {
		return m.lines_fact_unknown();
	}
	return oxygen.lpm === 0 ? m.lines_fact_none() : m.lines_fact_flow({ lpm: oxygen.lpm });
}
