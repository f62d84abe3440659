import type { MessageCause, MessageChannel, MessageKind, MessageState } from '$lib/domain/messages/codes';
import type { LogEvent, LogReceiver } from '$lib/domain/messages/log';
import type { MailFact } from '$lib/domain/messages/mail-contents';
import type { MessageLanguage } from '$lib/domain/messages/templates/wording';
import { m } from '$lib/i18n/paraglide/messages';
import { ROLE_WORDS } from '../shell/role-words';

/** The words of the message log, one record for each closed list. */
export const CHANNEL_WORDS: Record<MessageChannel, () => string> = {
	sms: m.log_channel_sms,
	mail: m.log_channel_mail,
	voice: m.log_channel_voice,
	push: m.log_channel_push
};

export const KIND_WORDS: Record<MessageKind, () => string> = {
	escalation: m.log_kind_escalation,
	notice: m.log_kind_notice,
	reminder: m.log_kind_reminder,
	answer: m.log_kind_answer,
	mail: m.log_kind_mail,
	visit: m.log_kind_visit,
	page: m.log_kind_page,
	trial: m.log_kind_trial
};

export const STATE_WORDS: Record<MessageState, () => string> = {
	ready: m.log_state_ready,
	sending: m.log_state_sending,
	accepted: m.log_state_accepted,
	delivered: m.log_state_delivered,
	undelivered: m.log_state_undelivered,
	failed: m.log_state_failed,
	skipped: m.log_state_skipped,
	cancelled: m.log_state_cancelled,
	held: m.log_state_held
};

export const CAUSE_WORDS: Record<MessageCause, () => string> = {
	escalation: m.log_cause_escalation,
	visit: m.log_cause_visit,
	referral: m.log_cause_referral,
	inbound: m.log_cause_inbound,
	account: m.log_cause_account,
	episode: m.log_cause_episode,
	page: m.log_cause_page
};

export const LANGUAGE_WORDS: Record<MessageLanguage, () => string> = {
	en: m.log_language_en,
	es: m.log_language_es
};

export const FACT_WORDS: Record<MailFact, () => string> = {
	sender: m.log_tells_sender,
	phone: m.log_tells_phone,
	time: m.log_tells_time,
	place: m.log_tells_place,
	minutes: m.log_tells_minutes,
	count: m.log_tells_count,
	link: m.log_tells_link,
	unit: m.log_tells_unit,
	bed: m.log_tells_bed,
	grade: m.log_tells_grade
};

const OUTCOME_WORDS: Record<string, () => string> = {
	accepted: m.log_outcome_accepted,
	permanent: m.log_outcome_permanent,
	transient: m.log_outcome_transient,
	unknown: m.log_outcome_unknown
};

const RECEIVED_WORDS: Record<string, () => string> = {
	yes: m.log_received_yes,
	no: m.log_received_no,
	acknowledged: m.log_received_acknowledged,
	stop: m.log_received_stop,
	start: m.log_received_start,
	help: m.log_received_help,
	take: m.log_received_take,
	staff: m.log_received_staff,
	'staff-stop': m.log_received_staff_stop,
	'shared-staff': m.log_received_shared_staff,
	'shared-number': m.log_received_shared_number,
	'unknown-number': m.log_received_unknown_number
};

/** What something that came in was taken for. */
export function receivedWords(understoodAs: string): string {
	return (RECEIVED_WORDS[understoodAs] ?? m.log_received_other)();
}

/** Why the words of something that came in are not shown. */
export const UNREAD_WORDS = { removed: m.log_body_gone, private: m.log_received_private };

/** Of these a person may have to do something. */
export function isStuck(state: MessageState): boolean {
	return state === 'failed' || state === 'undelivered' || state === 'held';
}

export function receiverWords(to: LogReceiver): string {
	switch (to.kind) {
		case 'staff':
			return m.log_to_staff({ name: to.name, role: ROLE_WORDS[to.role]() });
		case 'patient':
			return to.number === null ? m.log_to_patient_plain() : m.log_to_patient({ number: to.number });
		case 'nobody':
			return to.number === null ? m.log_to_nobody_plain() : m.log_to_nobody({ number: to.number });
	}
}

/** What happened, and small beside it the gateway's own code. */
export function eventWords(event: LogEvent): { words: string; code: string | null } {
	switch (event.what) {
		case 'written':
			return { words: m.log_event_written(), code: null };
		case 'attempt': {
			const outcome = OUTCOME_WORDS[event.outcome]?.() ?? event.outcome;
			return { words: m.log_event_attempt({ number: event.number, outcome }), code: event.code };
		}
		case 'told':
			return { words: m.log_event_told({ status: event.status }), code: event.errorCode };
		case 'resent':
			return { words: m.log_event_resent({ by: event.by, reason: event.reason }), code: null };
		case 'handled':
			return { words: m.log_event_handled({ by: event.by }), code: null };
	}
}
