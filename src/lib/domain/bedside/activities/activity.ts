/** The shape of a catalogue entry, and the words that entries share. */
import type { ClearanceKind, Level } from '../../core/codes';
import type { Phase } from '../codes';
import type { SourceId } from '../limits/sources';
import type { ActivityCode } from './codes';

/** From and to, both included. */
export type Span = readonly [from: number, to: number];

/** The usual dose. What is null is not dosed that way. */
export interface Dose {
	readonly minutes: Span | null;
	readonly repetitions: Span | null;
	readonly timesADay: Span | null;
	/** The dose as one says it, with what the numbers leave out. */
	readonly words: string;
}

export interface Activity {
	readonly code: ActivityCode;
	readonly name: string;
	/** The level the patient has reached when this is first done. */
	readonly level: Level;
	readonly phase: Phase;
	/** Energy band in METs, estimated. */
	readonly mets: Span;
	/** Passive work is done to a patient, who need not follow commands. */
	readonly mode: 'active' | 'passive';
	/** Moves the arms, so that their height is asked for after a sternotomy. */
	readonly arms: boolean;
	/** On the feet and moving: the pressure afterwards is then needed. */
	readonly walking: boolean;
	readonly stairs: boolean;
	/** The clearance that must be in force; the arm stage after a sternotomy only. */
	readonly clearance: ClearanceKind | null;
	/** The clearance that need not be asked for, but bars the activity while it is refused, held or withdrawn. */
	readonly heldBy: ClearanceKind | null;
	/** What must hold beside the clearance, in words. */
	readonly needs: readonly string[];
	readonly dose: Dose;
	readonly howTo: readonly string[];
	readonly watch: readonly string[];
	readonly never: readonly string[];
	/** Where the dose comes from. */
	readonly source: SourceId;
}

/** An entry as it is written down: what most entries have in common may be left out. */
export type Draft = Pick<Activity, 'code' | 'name' | 'howTo' | 'watch' | 'never'> &
	Partial<Omit<Activity, 'dose'>> & { readonly dose: Partial<Dose> & { readonly words: string } };

const DEFAULTS = {
	phase: 'inpatient',
	mode: 'active',
	arms: false,
	walking: false,
	stairs: false,
	clearance: null,
	heldBy: null,
	needs: [],
	source: 'common-practice'
} as const;

/** Complete the entries of one level. */
export function atLevel(level: Level, mets: Span, drafts: readonly Draft[]): Activity[] {
	return drafts.map((draft) => ({
		...DEFAULTS,
		level,
		mets,
		...draft,
		dose: { minutes: null, repetitions: null, timesADay: null, ...draft.dose }
	}));
}
