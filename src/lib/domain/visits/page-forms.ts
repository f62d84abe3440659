/**
 * The forms by which visits are booked and moved: each field as it was typed, called by the words of its label. The
 * bodies in `forms.ts` are what the JSON API takes and names.
 */
import { z } from 'zod';
import { reason, text, typedDay, typedNumber, typedTime } from '../core/fields';
import { WEEKDAYS } from '../core/time';
import { COUNT_MAX, MINUTES_MAX, MINUTES_MIN, NAME_MAX } from './limits';

/** When, how long and where, of a single visit and of each of a series. */
const visit = {
	time: typedTime('Time'),
	minutes: typedNumber('Minutes', { low: MINUTES_MIN, high: MINUTES_MAX, whole: true, needed: true }),
	place: z.string('Place: choose one.').min(1, 'Place: choose one.')
};
const patient = z.string('Patient: choose one.').min(1, 'Patient: choose one.');

export const bookVisitForm = z.strictObject({ patient, date: typedDay('Day'), ...visit });

export const bookSeriesForm = z.strictObject({
	patient,
	from: typedDay('From'),
	weekdays: z.array(z.enum(WEEKDAYS)).min(1, 'Weekdays: choose at least one.'),
	count: typedNumber('Number of visits', { low: 1, high: COUNT_MAX, whole: true, needed: true }),
	...visit
});

export const moveVisitForm = z.strictObject({
	date: typedDay('Day'),
	...visit,
	reason: reason('Why it moves').optional()
});

export const closeDayForm = z.strictObject({
	date: typedDay('Day'),
	name: text('Name of the day', NAME_MAX)
});
