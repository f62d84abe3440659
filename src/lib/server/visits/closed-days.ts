import { and, asc, eq, gte, inArray, isNull, sql } from 'drizzle-orm';
import { invalidField, notFound, Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { addDays, localDateOf, type LocalDate } from '$lib/domain/core/time';
import { closedDayProblem } from '$lib/domain/visits/closed-days';
import type { ClosedDayBody } from '$lib/domain/visits/forms';
import type { ClosedDay } from '$lib/domain/visits/views';
import { isExpected } from '$lib/domain/visits/states';
import type { LiveEvent } from '$lib/domain/live/events';
import type { PersonContext } from '../context';
import { db, type Reader, type Tx } from '../db';
import { closedDays, units, visits } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { write, type Written } from '../write';

/** The days from `from` on when the hospital receives no visits, in order, with the visits that stand on them. */
export async function listClosedDays(from: LocalDate): Promise<ClosedDay[]> {
	const rows = await db()
		.select({
			id: closedDays.id,
			date: closedDays.date,
			name: closedDays.name,
			visits: sql<number>`(select count(*) from ${visits} where ${visits.localDate} = ${closedDays.date}
				and ${visits.state} in ('planned', 'confirmed'))`
		})
		.from(closedDays)
		.where(and(isNull(closedDays.removedAt), gte(closedDays.date, from)))
		.orderBy(asc(closedDays.date));
	return rows;
}

/** Today and later: what a booking steps over. */
export function closedDaysAhead(now: number): Promise<ClosedDay[]> {
	return listClosedDays(localDateOf(now, env().hospital.zone));
}

/** What the closed days are called on which visits stand that are expected, by visit; those on open days are left out. */
export async function closedNames(
	reader: Reader,
	rows: readonly Pick<typeof visits.$inferSelect, 'id' | 'state' | 'localDate'>[]
): Promise<Map<string, string>> {
	const expected = rows.filter(({ state }) => isExpected(state));
	const days = await reader
		.select({ date: closedDays.date, name: closedDays.name })
		.from(closedDays)
		.where(
			and(
				isNull(closedDays.removedAt),
				inArray(closedDays.date, [...new Set(expected.map(({ localDate }) => localDate))])
			)
		);
	const names = new Map(days.map(({ date, name }) => [date, name]));
	return new Map(
		expected.flatMap(({ id, localDate }): [string, string][] => {
			const name = names.get(localDate);
			return name === undefined ? [] : [[id, name]];
		})
	);
}

/** The closed days as a set, for planning. */
export async function closedDates(reader: Reader): Promise<Set<LocalDate>> {
	const rows = await reader
		.select({ date: closedDays.date })
		.from(closedDays)
		.where(isNull(closedDays.removedAt));
	return new Set(rows.map(({ date }) => date));
}

/** @throws Problem `invalid` at the pointer when the hospital is closed on that day, with the day's name */
export async function refuseClosedDay(reader: Reader, date: LocalDate, pointer: string): Promise<void> {
	const [day] = await reader
		.select({ name: closedDays.name })
		.from(closedDays)
		.where(and(eq(closedDays.date, date), isNull(closedDays.removedAt)));
	if (day) {
		throw invalidField(pointer, closedDayProblem(date, day.name));
	}
}

/**
 * Put a day on the list. Visits that stand on it stay where they are: somebody has to move them, one by one.
 * @throws Problem `invalid` for a day that is past or on the list already
 */
export function closeDay(context: PersonContext, { date, name }: ClosedDayBody): Promise<Written<ClosedDay>> {
	return write(context, 'closed-day.keep', async (tx) => {
		const today = localDateOf(context.now, env().hospital.zone);
		if (date < today || date > addDays(today, DAYS_KNOWN)) {
			throw invalidField(
				'/date',
				`date is ${date}: it must be from ${today} to ${addDays(today, DAYS_KNOWN)}.`
			);
		}
		const [known] = await tx
			.select({ name: closedDays.name })
			.from(closedDays)
			.where(and(eq(closedDays.date, date), isNull(closedDays.removedAt)));
		if (known) {
			throw invalidField('/date', `date is ${date}: it is on the list already, as ${known.name}.`);
		}
		const id = newId();
		await tx.insert(closedDays).values({ id, date, name, addedBy: context.actor.id, addedAt: context.now });
		const standing = await tx.$count(
			visits,
			and(eq(visits.localDate, date), inArray(visits.state, ['planned', 'confirmed']))
		);
		return {
			result: { id, date, name, visits: standing },
			audit: { action: 'closed-day.added', objectKind: 'closed-day', objectId: id, detail: { date } },
			events: [...(await forEveryUnit(tx, 'day-closed', id)), ...(await forVisitsOn(tx, date, 'day-closed'))]
		};
	});
}

/** As far ahead as anybody fixes holidays. */
const DAYS_KNOWN = 3 * 366;

/**
 * Take a day off the list.
 * @throws Problem `not-found`, and `wrong-state` for one that was taken off before
 */
export function openDay(
	context: PersonContext,
	id: string
): Promise<Written<{ id: string; removedAt: string }>> {
	return write(context, 'closed-day.keep', async (tx) => {
		const [day] = await tx.select().from(closedDays).where(eq(closedDays.id, id));
		if (!day) {
			throw notFound('closed day');
		}
		if (day.removedAt !== null) {
			throw new Problem('wrong-state', 'This day was taken off the list before.', { state: 'removed' });
		}
		await tx
			.update(closedDays)
			.set({ removedAt: context.now, removedBy: context.actor.id })
			.where(eq(closedDays.id, id));
		return {
			result: { id, removedAt: toRfc3339(context.now) },
			audit: {
				action: 'closed-day.removed',
				objectKind: 'closed-day',
				objectId: id,
				detail: { date: day.date }
			},
			events: [
				...(await forEveryUnit(tx, 'day-opened', id)),
				...(await forVisitsOn(tx, day.date, 'day-opened'))
			]
		};
	});
}

/** A closed day is the whole hospital's: everybody who plans visits hears of it. */
async function forEveryUnit(tx: Tx, kind: string, id: string): Promise<LiveEvent[]> {
	const rows = await tx.select({ unitId: units.id }).from(units);
	return rows.map(({ unitId }) => ({ topic: 'visit', kind, id, episodeId: null, unitId }));
}

/** The pages of the patients whose visits stand on the day say so. */
async function forVisitsOn(tx: Tx, date: LocalDate, kind: string): Promise<LiveEvent[]> {
	const rows = await tx
		.select({ id: visits.id, episodeId: visits.episodeId })
		.from(visits)
		.where(and(eq(visits.localDate, date), inArray(visits.state, ['planned', 'confirmed'])));
	return rows.map(({ id, episodeId }) => ({ topic: 'visit', kind, id, episodeId }));
}
