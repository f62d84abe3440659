import { sql } from 'drizzle-orm';
import { POSTS } from '$lib/domain/core/codes';
import type { Tx } from '../../db';
import { newId } from '../../ids';
import type { Calendar } from './calendar';
import { COVER, UNITS } from './people';
import type { Found } from './found';

/** From before the first story to a year and a day ahead: as far as the clock of a demonstration is moved. */
const DAYS_BACK = 84;
const DAYS_AHEAD = 368;
const DAY_SHIFT = '08:00';
const NIGHT_SHIFT = '20:00';
/** Fill the roster: a day and a night shift for every post of every unit, without a gap. */
export async function fillCover(tx: Tx, found: Found, calendar: Calendar): Promise<void> {
	const shifts = shiftsOf(calendar);
	const rows = UNITS.flatMap(({ name }) =>
		POSTS.flatMap((post) =>
			shifts.map(([from, until]) => [
				newId(),
				found.units[name],
				post,
				found.people[COVER[post]].id,
				from,
				until
			])
		)
	);
	// Ten thousand shifts as one value, because as many lists of placeholders take far longer to bind.
	await tx.run(sql`
		insert into cover_shifts (id, unit_id, post, user_id, starts_at, ends_at)
		select value ->> 0, value ->> 1, value ->> 2, value ->> 3, value ->> 4, value ->> 5
		from json_each(${JSON.stringify(rows)})`);
}

/** The bounds of all shifts in order; each ends when the next begins, whatever the clock does in between. */
function shiftsOf(calendar: Calendar): [startsAt: number, endsAt: number][] {
	const bounds: number[] = [];
	for (let day = -DAYS_BACK; day <= DAYS_AHEAD; day += 1) {
		bounds.push(calendar.on(-day, DAY_SHIFT), calendar.on(-day, NIGHT_SHIFT));
	}
	return bounds.slice(1).map((endsAt, index) => [bounds[index] ?? endsAt, endsAt]);
}
