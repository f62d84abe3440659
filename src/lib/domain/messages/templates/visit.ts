/**
 * Texts to patients about a visit. They say who sends, when, where, how to answer, whom to call and how to end
 * the texts, in one part; they hold no name of a person and no clinical word, whatever the fields are called.
 */
import { number, withNames, type VisitFields } from './frame';
import { dayAndTime } from './wording';
import type { Wording } from './wording';

export interface ReminderFields extends VisitFields {
	/** A patient who has said yes is not asked again. */
	readonly confirmed: boolean;
}

export const visitReminder: Wording<ReminderFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		const how = fields.confirmed ? 'Reply NO if you cannot come' : 'Reply YES or NO';
		return withNames(fields, 'en', (sender, place) => {
			return `${sender}: your visit is ${when}, ${place}. ${how}. Questions: ${number(fields)}. STOP ends texts.`;
		});
	},
	es: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'es');
		const how = fields.confirmed ? 'Responda NO si no puede venir' : 'Responda SI o NO';
		return withNames(fields, 'es', (sender, place) => {
			return `${sender}: su cita es ${when}, ${place}. ${how}. Preguntas: ${number(fields)}. STOP: no mas textos.`;
		});
	}
};

/** The hospital has moved it: the time in the text is the new one. */
export const visitMoved: Wording<VisitFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		return withNames(fields, 'en', (sender, place) => {
			return `${sender}: your visit is MOVED to ${when}, ${place}. Reply YES or NO. Questions: ${number(fields)}. STOP ends texts.`;
		});
	},
	es: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'es');
		return withNames(fields, 'es', (sender, place) => {
			return `${sender}: su cita CAMBIA a ${when}, ${place}. Responda SI o NO. Preguntas: ${number(fields)}. STOP: no mas textos.`;
		});
	}
};

/** The hospital has cancelled. */
export const visitCancelled: Wording<VisitFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		return withNames(fields, 'en', (sender) => {
			return `${sender}: your visit ${when} is cancelled. Please do not come. Questions: ${number(fields)}.`;
		});
	},
	es: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'es');
		return withNames(fields, 'es', (sender) => {
			return `${sender}: su cita ${when} se ha anulado. No venga, por favor. Preguntas: ${number(fields)}.`;
		});
	}
};

/** The hospital has cancelled all visits ahead: one text for all of them, which tells the next. */
export const visitsCancelled: Wording<VisitFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		return withNames(fields, 'en', (sender) => {
			return `${sender}: all your visits from ${when} on are cancelled. Please do not come. Questions: ${number(fields)}.`;
		});
	},
	es: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'es');
		return withNames(fields, 'es', (sender) => {
			return `${sender}: todas sus citas desde el ${when} se han anulado. No venga, por favor. Preguntas: ${number(fields)}.`;
		});
	}
};
