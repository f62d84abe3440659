/**
 * The bodies of the visit calls, for `POST /api/episodes/:id/visits`, the moves of a visit, and the pages.
 * A refusal names field, value and limit.
 */
import { z } from 'zod';
import { reason, text } from '../core/fields';
import { isRfc3339, parseRfc3339 } from '../core/instant';
import { WEEKDAYS, addDays, isLocalDate, isLocalTime, localDateOf } from '../core/time';
import type { Instant, Zone } from '../core/time';
import { COUNT_MAX, DAYS_AHEAD_MAX, MINUTES_MAX, MINUTES_MIN, NAME_MAX, PLACE_MAX } from './limits';

export { COUNT_MAX, DAYS_AHEAD_MAX, MINUTES_MAX, MINUTES_MIN, PLACE_MAX };

function wholeNumber(field: string, low: number, high: number) {
	const error = ({ input }: { input?: unknown }) =>
		`${field} is ${shown(input)}: it must be a whole number from ${low} to ${high}.`;
	return z.int({ error }).min(low, { error }).max(high, { error });
}

function written(field: string, isRight: (value: string) => boolean, shape: string) {
	const error = ({ input }: { input?: unknown }) => `${field} is ${shown(input)}: it must be ${shape}.`;
	return z.string({ error }).refine(isRight, { error });
}

const startsAt = written('startsAt', isRfc3339, 'an instant such as 2025-03-28T10:00:00Z');
const localDate = (field: string) => written(field, isLocalDate, 'a day that exists, as YYYY-MM-DD');
const localTime = written('time', isLocalTime, 'a time from 00:00 to 23:59, as HH:MM');
const minutes = wholeNumber('minutes', MINUTES_MIN, MINUTES_MAX);
/** A place by id or exact name. */
const place = text('The place', PLACE_MAX);

const weekdays = z
	.array(
		z.enum(WEEKDAYS, {
			error: ({ input }) => `weekdays holds ${shown(input)}: each must be one of ${WEEKDAYS.join(', ')}.`
		}),
		{ error: ({ input }) => `weekdays is ${shown(input)}: it must be a list such as ["mon","wed","fri"].` }
	)
	.min(1, 'weekdays is empty: it must hold 1 to 7 days.')
	.refine((days) => new Set(days).size === days.length, 'weekdays holds the same day twice.');

/** A series in the hospital's local time; its first visit is on or after `from`. */
export const seriesBody = z.strictObject({
	from: localDate('from'),
	weekdays,
	time: localTime,
	count: wholeNumber('count', 1, COUNT_MAX),
	minutes,
	place
});
export type SeriesBody = z.infer<typeof seriesBody>;

/** What to book: one visit at an instant, or a series in local time. */
export type BookVisits =
	| { readonly kind: 'single'; readonly startsAt: Instant; readonly minutes: number; readonly place: string }
	| ({ readonly kind: 'series' } & SeriesBody);

/** Body of `POST /api/episodes/:id/visits`: `{startsAt, minutes, place}` or `{series}`, never both. */
export const bookVisitsBody = z
	.strictObject({
		startsAt: startsAt.optional(),
		minutes: minutes.optional(),
		place: place.optional(),
		series: seriesBody.optional()
	})
	.transform((body, context): BookVisits => {
		const refuse = (field: string, message: string) => {
			context.issues.push({ code: 'custom', path: [field], message, input: body });
			return z.NEVER;
		};
		if (body.series) {
			const beside = (['startsAt', 'minutes', 'place'] as const).find((field) => body[field] !== undefined);
			return beside
				? refuse(beside, `${beside} stands beside series: a series has its own, inside.`)
				: { kind: 'series', ...body.series };
		}
		if (body.startsAt === undefined) {
			return refuse('startsAt', 'startsAt is missing: give startsAt, minutes and place, or a series.');
		}
		if (body.minutes === undefined) {
			return refuse('minutes', `minutes is missing: it must be from ${MINUTES_MIN} to ${MINUTES_MAX}.`);
		}
		if (body.place === undefined) {
			return refuse('place', 'place is missing.');
		}
		return {
			kind: 'single',
			startsAt: parseRfc3339(body.startsAt),
			minutes: body.minutes,
			place: body.place
		};
	});

/** Body of `POST /api/visits/:id/move`: the new start, and what else changes. */
export const rescheduleBody = z.strictObject({
	startsAt: startsAt.transform(parseRfc3339),
	minutes: minutes.optional(),
	place: place.optional(),
	reason: reason('The reason').optional()
});
export type Reschedule = z.infer<typeof rescheduleBody>;

/** Body of `POST /api/closed-days`. */
export const closedDayBody = z.strictObject({ date: localDate('date'), name: text('The name', NAME_MAX) });
export type ClosedDayBody = z.infer<typeof closedDayBody>;

/** Body of `POST /api/visits/:id/confirm`, `/cancel`, `/attend`, `/miss`; it may be left out. */
export const visitMoveBody = z.strictObject({ reason: reason('The reason').optional() }).prefault({});
export type VisitMoveBody = z.infer<typeof visitMoveBody>;

/** Body of `POST /api/visits/:id/reopen`, and of every other move that says why. */
export const reopenBody = z.strictObject({ reason: reason('The reason') });

/** Why a visit cannot be booked for this start, or null: it must lie ahead, by two years at most. */
export function startProblem(at: Instant, now: Instant, zone: Zone): string | null {
	const shownAt = new Date(at).toISOString();
	if (at < now) {
		return `startsAt is ${shownAt}: it must not be in the past.`;
	}
	return localDateOf(at, zone) > addDays(localDateOf(now, zone), DAYS_AHEAD_MAX)
		? `startsAt is ${shownAt}: it must be at most ${DAYS_AHEAD_MAX} days ahead.`
		: null;
}

/** What was sent, as far as it may be repeated: short, and never a whole object. */
function shown(value: unknown): string {
	if (value === undefined) {
		return 'missing';
	}
	return typeof value === 'object' && value !== null
		? 'not a plain value'
		: JSON.stringify(value).slice(0, 60);
}
