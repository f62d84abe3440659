/**
 * What a unit says about an activity in its own words: name, dose, lines, and what it asks for first besides. Level,
 * energy band, clearances, what the catalogue needs first and what the rules look at stay, so that no change of words
 * opens a gate. Findings and the record name an activity as the catalogue does.
 */
import type { Activity, Dose } from './activity';
import { ACTIVITIES } from './activities';
import type { ActivityCode } from './codes';

/** The parts of an entry that a unit may word anew. */
export interface LocalLines {
	/** Missing where the catalogue's name stays, as in wordings of before units had names. */
	readonly name?: string;
	/** What the unit asks for first besides what the catalogue needs. */
	readonly needs?: readonly string[];
	readonly dose: Dose;
	readonly howTo: readonly string[];
	readonly watch: readonly string[];
	readonly never: readonly string[];
}

/** One unit's wording of one activity, with who answers for it. */
export interface LocalActivity {
	readonly code: ActivityCode;
	/** Null goes back to the catalogue. */
	readonly lines: LocalLines | null;
	readonly version: number;
	/** The clinical lead. */
	readonly agreedBy: string;
	/** `YYYY-MM-DD` */
	readonly agreedOn: string;
}

/** An entry as a unit has it. */
export interface UnitActivity extends Activity {
	/** Null where the catalogue speaks. */
	readonly local: Pick<LocalActivity, 'version' | 'agreedBy' | 'agreedOn'> | null;
}

/** The catalogue of a unit. `changes` may hold several versions of an entry: the newest counts. */
export function activitiesOf(changes: readonly LocalActivity[]): UnitActivity[] {
	return ACTIVITIES.map((activity) => worded(activity, changes));
}

/** One entry in the words of the unit. */
export function worded(activity: Activity, changes: readonly LocalActivity[]): UnitActivity {
	const newest = changes
		.filter(({ code }) => code === activity.code)
		.reduce<LocalActivity | null>((last, each) => (last && last.version > each.version ? last : each), null);
	if (!newest?.lines) {
		return { ...activity, local: null };
	}
	const { lines, version, agreedBy, agreedOn } = newest;
	const { name = activity.name, needs = [], ...rest } = lines;
	// A figure of the unit has no published source, whatever the catalogue's own figure had.
	return {
		...activity,
		...rest,
		name,
		needs: [...activity.needs, ...needs],
		source: 'common-practice',
		local: { version, agreedBy, agreedOn }
	};
}
