/** The limits of a booking, apart from the schemas, so that a page which only plans does not load zod. */
export const MINUTES_MIN = 10;
export const MINUTES_MAX = 240;
export const COUNT_MAX = 60;
export const PLACE_MAX = 80;
/** How far ahead a visit may be booked: two years, so that the yearly check fits and a slip in the year shows. */
export const DAYS_AHEAD_MAX = 731;
