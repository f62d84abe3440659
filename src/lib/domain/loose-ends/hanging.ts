/** What hangs from a patient's rope: the loose ends about them, without a word of what was said. */
import type { Strand } from '../core/codes';
import { toRfc3339 } from '../core/instant';
import type { LooseEndKind, OpenThing } from './loose-ends';
import { byUrgency } from './order';
import { owedBy } from './owed-by';

/** One open thing as a lane shows it: what kind, whose answer is owed, since when (RFC 3339). */
export interface HangingEnd {
	kind: LooseEndKind;
	/** The service, the clearance kind or the role that a question is put to; null where the kind says it all. */
	code: string | null;
	strand: Strand;
	since: string;
}

const OF_A_CALL: ReadonlySet<LooseEndKind> = new Set([
	'escalation',
	'escalation-taken',
	'arrival',
	'confirm',
	'recheck',
	'physician-to-tell'
]);

/**
 * The ends of each episode, the most urgent first. An escalation that others are sought for is one thing, however
 * many rows it has for those whom it waits on.
 *
 * @param readsCalls whether the reader may know of escalations
 */
export function hangingEnds(things: readonly OpenThing[], readsCalls: boolean): Map<string, HangingEnd[]> {
	const ends = new Map<string, HangingEnd[]>();
	const calls = new Set<string>();
	for (const thing of things.toSorted(byUrgency)) {
		const ofACall = OF_A_CALL.has(thing.kind);
		if (thing.episodeId === null || (ofACall && (!readsCalls || calls.has(thing.id)))) {
			continue;
		}
		if (ofACall) {
			calls.add(thing.id);
		}
		ends.set(thing.episodeId, [...(ends.get(thing.episodeId) ?? []), toHangingEnd(thing)]);
	}
	return ends;
}

function toHangingEnd(thing: OpenThing): HangingEnd {
	const { kind, code, since } = thing;
	return { kind, code, strand: owedBy(thing), since: toRfc3339(since) };
}
