/** What a patient who has written gets back: in one part, without a name of a person and without a clinical word. */
import { number, withNames, withSender, type HelpFields, type SenderFields, type VisitFields } from './frame';
import { dayAndTime } from './wording';
import type { Wording } from './wording';

/** Answer to YES. */
export const visitConfirmed: Wording<VisitFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		return withNames(fields, 'en', (sender, place) => {
			return `${sender}: thank you, see you ${when}, ${place}. To change it call ${number(fields)}.`;
		});
	},
	es: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'es');
		return withNames(fields, 'es', (sender, place) => {
			return `${sender}: gracias, le esperamos ${when}, ${place}. Para cambiarla llame al ${number(fields)}.`;
		});
	}
};

/** Answer to NO. */
export const visitDeclined: Wording<VisitFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		return withSender(fields, 'en', (sender) => {
			return `${sender}: thank you, ${when} is cancelled. We will call about another time, or call ${number(fields)}.`;
		});
	},
	es: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'es');
		return withSender(fields, 'es', (sender) => {
			return `${sender}: gracias, ${when} queda anulada. Le llamaremos para otra hora, o llame al ${number(fields)}.`;
		});
	}
};

/** YES or NO, and no visit waits for it. */
export const noVisitOpen: Wording<SenderFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			return `${sender}: no visit is waiting for your answer. Questions: ${number(fields)}.`;
		}),
	es: (fields) =>
		withSender(fields, 'es', (sender) => {
			return `${sender}: ninguna cita espera su respuesta. Preguntas: ${number(fields)}.`;
		})
};

/** Answer to what only a person can read. It must not look as if somebody were watching. */
export const personReads: Wording<HelpFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			const soon = `A person will read it, but not at once. Sooner: ${number(fields)}.`;
			return `${sender}: thank you. ${soon} In an emergency call ${fields.emergency}.`;
		}),
	es: (fields) =>
		withSender(fields, 'es', (sender) => {
			const soon = `Una persona lo leera, pero no enseguida. Antes: ${number(fields)}.`;
			return `${sender}: gracias. ${soon} Si es una emergencia llame al ${fields.emergency}.`;
		})
};

/** Answer to STOP: the one last text. */
export const textsStopped: Wording<SenderFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			return `${sender}: no more texts will come. START brings them back. Questions: ${number(fields)}.`;
		}),
	es: (fields) =>
		withSender(fields, 'es', (sender) => {
			return `${sender}: no recibira mas textos. Con START vuelven. Preguntas: ${number(fields)}.`;
		})
};

/** Answer to START. */
export const textsStarted: Wording<SenderFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			return `${sender}: texts about your visits will come again. STOP ends them. Questions: ${number(fields)}.`;
		}),
	es: (fields) =>
		withSender(fields, 'es', (sender) => {
			return `${sender}: los textos sobre sus citas vuelven a llegar. STOP los para. Preguntas: ${number(fields)}.`;
		})
};

/** Answer to HELP. */
export const textsHelp: Wording<HelpFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			const how = `Reply YES, NO, or STOP to end texts. Questions: ${number(fields)}.`;
			return `${sender}: ${how} In an emergency call ${fields.emergency}.`;
		}),
	es: (fields) =>
		withSender(fields, 'es', (sender) => {
			const how = `Responda SI, NO o STOP. Preguntas: ${number(fields)}.`;
			return `${sender}: ${how} Si es una emergencia llame al ${fields.emergency}.`;
		})
};
