import { dayAndClock } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';
import type { VisitMove } from '$lib/domain/visits/states';
import type { visits } from '../db/schema';

type VisitRow = typeof visits.$inferSelect;

/** What the thread says when visits were booked. */
export function bookedText(booked: readonly VisitRow[], now: number): string {
	const [first] = booked;
	const last = booked.at(-1);
	if (!first || !last) {
		return '';
	}
	const when = whenOf(first, now);
	return booked.length === 1
		? m.visits_entry_booked({ when, place: first.place })
		: m.visits_entry_booked_series({
				count: booked.length,
				first: when,
				last: whenOf(last, now),
				place: first.place
			});
}

/** What the thread says when a visit has another time or place. */
export function rescheduledText(
	before: VisitRow,
	visit: VisitRow,
	reason: string | null,
	now: number
): string {
	const [from, to] = [whenOf(before, now), whenOf(visit, now)];
	const words =
		from === to && before.place === visit.place
			? m.visits_entry_length({ when: to, minutes: visit.minutes })
			: m.visits_entry_rescheduled({ from, to, place: visit.place });
	return reason === null ? words : m.visits_entry_with_reason({ words, reason });
}

/** What the thread says when a visit moved on, and who moved it. */
export function movedText(
	visit: VisitRow,
	move: VisitMove,
	by: 'staff' | 'text' | 'page',
	reason: string | null,
	now: number
): string {
	const when = whenOf(visit, now);
	const words = (by === 'staff' ? MOVED[move] : BY_PATIENT[by][move === 'confirm' ? 'confirm' : 'cancel'])({
		when
	});
	return reason === null ? words : m.visits_entry_with_reason({ words, reason });
}

const BY_PATIENT = {
	text: { confirm: m.visits_entry_patient_confirmed, cancel: m.visits_entry_patient_cancelled },
	page: { confirm: m.visits_entry_page_confirmed, cancel: m.visits_entry_page_cancelled }
};

const MOVED: Record<VisitMove, (inputs: { when: string }) => string> = {
	confirm: m.visits_entry_confirmed,
	cancel: m.visits_entry_cancelled,
	attend: m.visits_entry_attended,
	miss: m.visits_entry_missed,
	reopen: m.visits_entry_reopened
};

/** A visit's time as people say it, in the hospital's wall time. */
export function whenOf({ startsAt, zone }: Pick<VisitRow, 'startsAt' | 'zone'>, now: number): string {
	return dayAndClock(startsAt, { zone, now });
}
