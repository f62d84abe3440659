import type { WoundNote } from './views';

const PARTS = ['wound', 'sternum', 'note'] as const;
type Part = (typeof PARTS)[number];

/** How wound and breastbone stand: of each part what was noted last, however many looked at another part since. */
export interface StandingWound extends WoundNote {
	/** Who noted which part, and when; missing in what was stored before parts were kept, all of one note. */
	noted?: Partial<Record<Part, { at: string; by: string }>>;
}

/**
 * What holds after these notes: somebody who looks at the wound alone does not take back a breastbone that moves.
 * @param notes newest first
 * @returns null where nobody has noted anything; its time is that of the newest note
 */
export function standingWound(notes: readonly WoundNote[]): StandingWound | null {
	const [newest] = notes;
	if (newest === undefined) {
		return null;
	}
	const stand: StandingWound = { ...newest, noted: {} };
	for (const part of PARTS) {
		const last = notes.find((note) => note[part] !== null);
		if (last) {
			Object.assign(stand, { [part]: last[part] });
			stand.noted = { ...stand.noted, [part]: { at: last.at, by: last.by } };
		}
	}
	return stand;
}

/** The same as notes again, newest first: each holds the parts that one person noted at one time. */
export function notesThatStand(stand: StandingWound): WoundNote[] {
	const notes: WoundNote[] = [];
	for (const part of PARTS.filter((name) => stand[name] !== null)) {
		const { at, by } = stand.noted?.[part] ?? stand;
		let note = notes.find((other) => other.at === at && other.by === by);
		if (!note) {
			note = { at, by, wound: null, sternum: null, note: null };
			notes.push(note);
		}
		Object.assign(note, { [part]: stand[part] });
	}
	return notes.sort((one, other) => other.at.localeCompare(one.at));
}
