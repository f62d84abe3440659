import type { SkipReason } from '$lib/domain/visits/reminders';
import type { NoReminder, ReminderFate, VisitItem } from '$lib/domain/visits/views';
import { when, type Reader } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';

/** What became of one reminder, and whether a person has to see to it. */
export interface FateWords {
	words: string;
	alarming: boolean;
}

/** Reminders that have gone, or will: a person need not see to the visit. */
const ON_ITS_WAY: readonly string[] = ['ready', 'sending', 'accepted', 'delivered'];

/**
 * The reminders of a visit in words, then the patient's answer. One that was not sent alarms only where no other
 * one reaches the patient either.
 */
export function fateWords(
	{ reminders, answer, noReminder }: Pick<VisitItem, 'reminders' | 'answer' | 'noReminder'>,
	reader: Reader
): FateWords[] {
	if (noReminder !== null && answer === null) {
		return [alarm(m.visits_fate_will_not_go({ reason: NO_REMINDER[noReminder]() }))];
	}
	const reached = answer !== null || reminders.some(({ state }) => ON_ITS_WAY.includes(state));
	const fates = reminders.map((fate): FateWords => {
		const { words, alarming } = wordsOf(fate, reader);
		return { words, alarming: alarming && !reached };
	});
	if (answer === null) {
		return fates.length > 0 ? fates : [calm(m.visits_fate_none())];
	}
	const time = when(Date.parse(answer.at), reader);
	return [...fates, calm(answer.yes ? m.visits_answer_yes({ time }) : m.visits_answer_no({ time }))];
}

function wordsOf({ state, reason, dueAt, sentAt }: ReminderFate, reader: Reader): FateWords {
	const due = when(Date.parse(dueAt), reader);
	const sent = when(Date.parse(sentAt ?? dueAt), reader);
	switch (state) {
		case 'ready':
		case 'sending':
			return calm(m.visits_fate_planned({ time: due }));
		case 'accepted':
			return calm(m.visits_fate_sent({ time: sent }));
		case 'delivered':
			return calm(m.visits_fate_delivered({ time: sent }));
		case 'held':
			return alarm(m.visits_fate_held());
		case 'cancelled':
			return calm(m.visits_fate_dropped());
		case 'skipped':
			return alarm(m.visits_fate_skipped({ reason: reasonWords(reason) }));
		default:
			return alarm(m.visits_fate_failed({ reason: reasonWords(reason) }));
	}
}

const NO_REMINDER: Record<NoReminder, () => string> = {
	'no-number': m.visits_skip_number,
	'no-address': m.visits_skip_address,
	'opted-out': m.visits_skip_opted_out,
	'no-consent': m.visits_skip_consent,
	'too-late-for-one': m.visits_skip_booked_late
};

const SKIPPED: Record<SkipReason, () => string> = {
	'visit is over or cancelled': m.visits_skip_over,
	'visit has moved': m.visits_skip_moved,
	'too late': m.visits_skip_late,
	'no telephone number': m.visits_skip_number,
	'no consent': m.visits_skip_consent,
	'opted out': m.visits_skip_opted_out
};

/** The reason in our words; what the log alone knows is shown as it stands there. */
function reasonWords(reason: string | null): string {
	return SKIPPED[reason as SkipReason]?.() ?? reason ?? m.visits_skip_unknown();
}

const calm = (words: string): FateWords => ({ words, alarming: false });
const alarm = (words: string): FateWords => ({ words, alarming: true });
