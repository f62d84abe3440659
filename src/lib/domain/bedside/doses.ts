/**
 * Doses and who answers for them. Where the usual dose is a range, its lower end is the cautious figure: a junior
 * stays there, a senior signs beyond it. More than the usual range is marked as such, whoever signs: what was
 * really done can always be recorded. Common practice, no published source.
 */
import type { Activity, Dose, Span } from './activities/activity';
import type { ActivityDone } from './forms';
import { plain } from './numbers';

export interface DoseNote {
	readonly field: 'minutes' | 'repetitions';
	readonly given: number;
	/** The cautious figure. */
	readonly cautious: number;
	readonly usual: Span;
	/** `senior`: beyond the cautious figure, within the usual. `unusual`: beyond both. */
	readonly kind: 'senior' | 'unusual';
	readonly words: string;
}

const FIELDS = ['minutes', 'repetitions'] as const satisfies readonly (keyof Dose & keyof ActivityDone)[];

/** What a given dose goes beyond; empty when it stays at the cautious figure or below, or is not stated. */
export function doseNotes(
	done: Pick<ActivityDone, 'minutes' | 'repetitions'>,
	activity: Activity
): DoseNote[] {
	return FIELDS.flatMap((field) => {
		const [given, usual] = [done[field], activity.dose[field]];
		return given == null || usual === null || given <= usual[0]
			? []
			: [note(field, given, usual, activity.name)];
	});
}

/** True when a senior has to sign for this dose. */
export function seniorSignsDose(
	done: Pick<ActivityDone, 'minutes' | 'repetitions'>,
	activity: Activity
): boolean {
	return doseNotes(done, activity).length > 0;
}

function note(field: DoseNote['field'], given: number, usual: Span, name: string): DoseNote {
	const [cautious, most] = usual;
	const kind = given > most ? 'unusual' : 'senior';
	const range = cautious === most ? plain(most) : `${plain(cautious)} to ${plain(most)}`;
	const words =
		kind === 'unusual'
			? `${name}: ${plain(given)} ${field} is more than the usual ${range}.`
			: `${name}: ${plain(given)} ${field} is beyond the cautious ${plain(cautious)}; a senior signs.`;
	return { field, given, cautious, usual, kind, words };
}
