/**
 * Texts to patients about a visit. They say who sends, when, where, how to answer, whom to call and how to end
 * the texts, in one part; they hold no name of a person and no clinical word, whatever the fields are called.
 */
import type { Instant, Zone } from '../../core/time';
import { dayAndTime, fitted, safeName } from './wording';
import type { MessageLanguage, Wording } from './wording';

export interface SenderFields {
	/** The hospital's name. */
	readonly sender: string;
	/** The number to call, as it should be read. */
	readonly phone: string;
}

export interface VisitFields extends SenderFields {
	readonly startsAt: Instant;
	/** The hospital's zone: the time is that of the clock on its wall. */
	readonly zone: Zone;
	readonly place: string;
}

export interface ReminderFields extends VisitFields {
	/** A patient who has said yes is not asked again. */
	readonly confirmed: boolean;
}

export interface HelpFields extends SenderFields {
	/** The public emergency number, such as 112. */
	readonly emergency: string;
}

const FALLBACK: Record<MessageLanguage, { sender: string; place: string }> = {
	en: { sender: 'Your hospital', place: 'the usual place' }
};

export const visitReminder: Wording<ReminderFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		const how = fields.confirmed ? 'Reply NO if you cannot come' : 'Reply YES or NO';
		return withNames(fields, 'en', (sender, place) => {
			return `${sender}: your visit is ${when}, ${place}. ${how}. Questions: ${number(fields)}. STOP ends texts.`;
		});
	}
};

/** Answer to YES. */
export const visitConfirmed: Wording<VisitFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		return withNames(fields, 'en', (sender, place) => {
			return `${sender}: thank you, see you ${when}, ${place}. To change it call ${number(fields)}.`;
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
	}
};

/** The hospital has cancelled. */
export const visitCancelled: Wording<VisitFields> = {
	en: (fields) => {
		const when = dayAndTime(fields.startsAt, fields.zone, 'en');
		return withSender(fields, 'en', (sender) => {
			return `${sender}: your visit ${when} is cancelled. Please do not come. Questions: ${number(fields)}.`;
		});
	}
};

/** YES or NO, and no visit waits for it. */
export const noVisitOpen: Wording<SenderFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			return `${sender}: no visit is waiting for your answer. Questions: ${number(fields)}.`;
		})
};

/** Answer to what only a person can read. It must not look as if somebody were watching. */
export const personReads: Wording<HelpFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			const soon = `A person will read it, but not at once. Sooner: ${number(fields)}.`;
			return `${sender}: thank you. ${soon} In an emergency call ${fields.emergency}.`;
		})
};

/** Answer to STOP: the one last text. */
export const textsStopped: Wording<SenderFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			return `${sender}: no more texts will come. START brings them back. Questions: ${number(fields)}.`;
		})
};

/** Answer to START. */
export const textsStarted: Wording<SenderFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			return `${sender}: texts about your visits will come again. STOP ends them. Questions: ${number(fields)}.`;
		})
};

/** Answer to HELP. */
export const textsHelp: Wording<HelpFields> = {
	en: (fields) =>
		withSender(fields, 'en', (sender) => {
			const how = `Reply YES, NO, or STOP to end texts. Questions: ${number(fields)}.`;
			return `${sender}: ${how} In an emergency call ${fields.emergency}.`;
		})
};

function withNames(
	fields: VisitFields,
	language: MessageLanguage,
	write: (sender: string, place: string) => string
): string {
	const fallback = FALLBACK[language];
	return fitted(write, safeName(fields.sender, fallback.sender), safeName(fields.place, fallback.place));
}

function withSender(
	fields: SenderFields,
	language: MessageLanguage,
	write: (sender: string) => string
): string {
	return fitted(write, safeName(fields.sender, FALLBACK[language].sender), '');
}

/** A number may be written wide on paper; in a text it must fit. */
function number({ phone }: SenderFields): string {
	return phone.length > 17 ? phone.replace(/[^\d+]/g, '') : phone;
}
