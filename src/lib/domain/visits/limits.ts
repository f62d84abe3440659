import { HOUR } from '../core/time';

/** The limits of a booking, apart from the schemas, so that a page which only plans does not load zod. */
export const MINUTES_MIN = 10;
export const MINUTES_MAX = 240;
export const COUNT_MAX = 60;
export const PLACE_MAX = 80;
/** Of a closed day. */
export const NAME_MAX = 80;
/** How far ahead a visit may be booked: two years, so that the yearly check fits and a slip in the year shows. */
export const DAYS_AHEAD_MAX = 731;
/**
 * How long before its start a visit that nobody has confirmed is somebody's to telephone about. The last reminder
 * goes at 17:00 the day before; for a visit at 09:00 that is as long before. Common practice, no published source.
 */
export const UNCONFIRMED_WITHIN_MS = 16 * HOUR;
