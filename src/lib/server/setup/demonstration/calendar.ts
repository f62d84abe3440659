import { addDays, instantOf, localDateOf, MINUTE, type Instant, type Zone } from '$lib/domain/core/time';

/** How far back the stories of a day go. */
const TODAY_MINUTES = 8 * 60;

/**
 * The days of the demonstration, counted back from its start. What happened on an earlier day has a wall time;
 * what happened today is counted in minutes, because the start may be at any hour of the day.
 */
export class Calendar {
	constructor(
		readonly start: Instant,
		readonly zone: Zone
	) {}

	/** `on(3, '14:05')`: three days ago at five past two. */
	on(daysAgo: number, time: string): Instant {
		return instantOf(this.date(-daysAgo), time, this.zone);
	}

	/** So many minutes before the start. */
	ago(minutes: number): Instant {
		return this.start - minutes * MINUTE;
	}

	/**
	 * So many minutes ago, eight hours at most, and on this day: after a start soon after midnight what belongs to
	 * one day is drawn closer together rather than spread over two.
	 */
	today(minutes: number): Instant {
		const sinceMidnight = (this.start - this.on(0, '00:00')) / MINUTE;
		return this.ago(Math.floor(minutes * Math.min(1, sinceMidnight / TODAY_MINUTES)));
	}

	/** The date so many days from today. */
	date(daysAhead: number): string {
		return addDays(localDateOf(this.start, this.zone), daysAhead);
	}
}
