/**
 * The limits that a session was judged by, as a picture needs them: for each value of each reading the nearest
 * stop and the nearest caution each way. They are worked out once, when the session is recorded, and kept with it,
 * so that a limit that is changed later does not redraw what was judged before.
 */
import { gather } from './assess';
import { DRAWN, type KeptBar } from './drawn';
import type { Assessment } from './forms';
import type { LimitSet } from './limits/limits';
import { absoluteBars } from './rules/absolute';
import { nearest } from './rules/bar';
import { changeBars } from './rules/change';
import { measured } from './timeline';

/** The bars beside every value that was measured, after the limits that `assess` is given. */
export function barsOf(input: Assessment, limits?: LimitSet): KeptBar[] {
	const facts = gather(input, limits);
	return facts.readings.flatMap((placed, reading) =>
		DRAWN.filter((measure) => measured(placed, measure) !== null).flatMap((measure) =>
			nearest([...absoluteBars(facts, placed, measure), ...changeBars(facts, placed, measure)]).map(
				(bar) => ({ ...bar, measure, reading })
			)
		)
	);
}
