import type { LooseEnd } from '$lib/domain/loose-ends/loose-ends';
import { rolesAsked } from '$lib/domain/loose-ends/owed-by';
import type { Service } from '$lib/domain/core/codes';
import { localDateOf, MINUTE } from '$lib/domain/core/time';
import { ago, DEFAULT_LOCALE, due, duration, shortDay, when, type Reader } from '$lib/format';
import { PRIORITY_WORDS, SERVICE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';
import { ROLE_WORDS } from '../shell/role-words';

/** How long something is open, or when it is due. */
export function waitWords(end: LooseEnd, reader: Reader): string {
	const open = reader.now - Date.parse(end.since);
	switch (end.kind) {
		case 'escalation':
			return end.heldBy
				? m.home_wait_absent({ name: end.heldBy, time: duration(open, reader.locale) })
				: m.home_wait_untaken({ time: duration(open, reader.locale) });
		case 'arrival':
		case 'confirm':
			return m.home_wait_answer({ time: duration(open, reader.locale) });
		case 'escalation-taken':
			return m.home_wait_taken({ time: duration(open, reader.locale) });
		case 'visit-unconfirmed':
			return end.due === null ? elapsed(end, reader) : when(Date.parse(end.due), reader);
		case 'recheck':
			return end.due === null ? elapsed(end, reader) : due(Date.parse(end.due), reader);
		default:
			return elapsed(end, reader);
	}
}

/** Whether something that has a time of its own is past it. */
export function isOverdue(end: LooseEnd, now: number): boolean {
	return end.kind === 'recheck' && end.due !== null && now - Date.parse(end.due) >= MINUTE;
}

/** Who asks, or what it is about: the part of the second line that stands after patient and unit. */
export function askerWords(end: LooseEnd, reader: Reader): string {
	const name = end.askedBy ?? '';
	switch (end.kind) {
		case 'escalation':
		case 'escalation-taken':
		case 'arrival':
			return m.home_asker_raised({ name });
		case 'confirm':
			return m.home_asker_passed({ name });
		case 'physician-to-tell':
			return m.home_asker_settled({ time: when(Date.parse(end.since), reader) });
		case 'recheck':
			return m.home_asker_settled({ time: when(Date.parse(end.since), reader) });
		case 'refusal':
			return m.home_asker_decided({ name });
		case 'deviation':
			return m.home_asker_did({ name });
		case 'clearance':
		case 'sign-off':
		case 'clearance-question':
			return m.home_asker_asks({ name });
		case 'referral':
			return end.priority === null
				? m.home_asker_asks({ name })
				: m.home_asker_referral({ priority: PRIORITY_WORDS[end.priority]().toLowerCase(), name });
		case 'mention':
			return m.home_asker_mention({ name });
		case 'visit-cancelled':
		case 'visit-untold':
			return end.due === null ? '' : m.home_asker_visit({ time: when(Date.parse(end.due), reader) });
		case 'visit-closed-day':
		case 'visit-unmarked':
			return end.due === null ? '' : m.home_asker_visit_at({ time: when(Date.parse(end.due), reader) });
		case 'message-failed':
			return MESSAGES[end.code ?? '']?.() ?? '';
		case 'precautions-due':
			return m.home_asker_precautions_due({
				day: shortDay(localDateOf(Date.parse(end.since), reader.zone), reader)
			});
		case 'visit-unconfirmed':
		case 'inbound':
			return '';
	}
}

/** Who owes it, for the person who waits; of an untaken escalation the time says it already. */
export function owerWords(end: LooseEnd): string {
	const name = end.heldBy ?? '';
	switch (end.kind) {
		case 'escalation':
			return '';
		case 'escalation-taken':
		case 'arrival':
			return m.home_ower_has({ name });
		case 'confirm':
			return m.home_ower_confirms({ name });
		case 'physician-to-tell':
			return m.home_ower_informs({ name });
		case 'recheck':
			return m.home_ower_measures({ name });
		case 'mention':
			return m.home_ower_answers({ name });
		case 'clearance-question':
			return m.home_ower_asked_back({ name });
		case 'deviation':
			return m.home_ower_sees({ roles: anyOf(rolesAsked(end).map((role) => ROLE_WORDS[role]())) });
		default:
			return m.home_ower_roles({ roles: anyOf(rolesAsked(end).map((role) => ROLE_WORDS[role]())) });
	}
}

/** What was done with one press, once it was: a referral accepted, the holder at the bedside, a deviation seen. */
export function doneWords({ kind, code, patientName }: LooseEnd): string {
	if (kind === 'deviation' || kind === 'refusal') {
		return m.home_seen({ who: patientName ?? '' });
	}
	if (kind === 'arrival' || kind === 'escalation-taken') {
		return m.home_arrived({ who: patientName ?? '' });
	}
	const service = SERVICE_WORDS[code as Service]?.() ?? '';
	return m.home_accepted({ service, who: patientName ?? '' });
}

/** That an ask has its answer, and from whom where that is known. */
export function answeredWords({ title, patientName }: LooseEnd, by: string | null): string {
	const what = { title, who: patientName ?? '' };
	return by === null ? m.home_answered(what) : m.home_answered_by({ ...what, name: by });
}

const MESSAGES: Record<string, () => string> = {
	reminder: m.home_message_reminder,
	escalation: m.home_message_escalation,
	answer: m.home_message_answer,
	mail: m.home_message_mail,
	visit: m.home_message_visit,
	page: m.home_message_page
};

function elapsed({ since }: LooseEnd, reader: Reader): string {
	const at = Date.parse(since);
	const minutes = Math.floor((reader.now - at) / MINUTE);
	return minutes < 1 ? ago(at, reader) : duration(minutes * MINUTE, reader.locale);
}

function anyOf(words: string[]): string {
	return new Intl.ListFormat(DEFAULT_LOCALE, { type: 'disjunction' }).format(words);
}
