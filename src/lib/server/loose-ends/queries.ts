import type { Person } from '$lib/domain/access/actor';
import { toRfc3339 } from '$lib/domain/core/instant';
import { whose, type LooseEnd, type LooseEnds, type OpenThing } from '$lib/domain/loose-ends/loose-ends';
import { byUrgency } from '$lib/domain/loose-ends/order';
import type { Reader } from '../db';
import { openThingsSql } from './open-things';
import { titleOf } from './titles';

/** As the database answers it, a list in JSON. */
type OpenRow = Omit<OpenThing, 'alsoAskedByIds'> & { alsoAskedByIds: string | null };

/** Everything open in the given units at `now`, in no particular order. */
export async function openThings(db: Reader, unitIds: readonly string[], now: number): Promise<OpenThing[]> {
	if (unitIds.length === 0) {
		return [];
	}
	const rows = await db.all<OpenRow>(openThingsSql(unitIds, now));
	return rows.map((row) => ({
		...row,
		alsoAskedByIds: row.alsoAskedByIds === null ? [] : (JSON.parse(row.alsoAskedByIds) as string[])
	}));
}

/** What waits on a person and what they wait for, each sorted as it is shown. */
export async function looseEndsOf(db: Reader, person: Person, now: number): Promise<LooseEnds> {
	const things = (await openThings(db, person.unitIds, now)).toSorted(byUrgency);
	const pick = (side: 'mine' | 'theirs') =>
		things.filter((thing) => whose(thing, person) === side).map(toLooseEnd);
	return { mine: pick('mine'), theirs: pick('theirs') };
}

function toLooseEnd(thing: OpenThing): LooseEnd {
	return {
		kind: thing.kind,
		id: thing.id,
		episodeId: thing.episodeId,
		threadId: thing.threadId,
		unit: thing.unit,
		bed: thing.bed,
		patientName: thing.patientName,
		grade: thing.grade,
		code: thing.code,
		priority: thing.priority,
		title: titleOf(thing),
		askedBy: thing.askedBy,
		heldBy: thing.heldBy,
		since: toRfc3339(thing.since),
		due: thing.due === null ? null : toRfc3339(thing.due)
	};
}
