import { can } from '$lib/domain/access/can';
import type { Role } from '$lib/domain/core/codes';
import type { LooseEnd } from '$lib/domain/loose-ends/loose-ends';
import { m } from '$lib/i18n/paraglide/messages';
import { routes } from '$lib/routes';

/** The one thing to do about a loose end. */
export interface Step {
	label: string;
	/** Where it is done; for a deed, where it can be done without script. */
	href: string;
	/** The write that does it right here, where one press is enough. */
	deed: string | null;
}

/** What the person is to do about something that waits on them. */
export function nextStep(end: LooseEnd, role: Role): Step {
	const { id, episodeId } = end;
	switch (end.kind) {
		case 'escalation':
			return onEscalation(id, 'take', m.home_step_take());
		case 'escalation-taken':
			return end.code === 'on-the-way'
				? onEscalation(id, 'arrive', m.home_step_arrive())
				: open(m.home_step_settle(), routes.escalation(id));
		case 'arrival':
			return onEscalation(id, 'arrive', m.home_step_arrive());
		case 'confirm':
			return onEscalation(id, 'confirm', m.home_step_confirm());
		case 'physician-to-tell':
			return open(m.home_step_inform(), routes.escalation(id));
		case 'recheck':
			return mayRecord(role) && episodeId
				? open(m.home_step_record(), routes.newSession(episodeId))
				: open(m.home_step_look(), routes.escalation(id));
		case 'clearance':
			return open(m.home_step_answer(), episodeId ? routes.clearance(episodeId, id) : routes.looseEnds());
		case 'clearance-question':
			return open(m.home_step_answer(), episodeId ? routes.clearance(episodeId, id) : routes.looseEnds());
		case 'refusal':
			return {
				label: m.home_step_seen(),
				href: episodeId ? routes.clearance(episodeId, id) : routes.looseEnds(),
				deed: `/api/clearances/${id}/acknowledge`
			};
		case 'deviation':
			return {
				label: m.home_step_seen(),
				href: placeOf(end) ?? routes.looseEnds(),
				deed: `/api/deviations/${id}/acknowledge`
			};
		case 'precautions-due':
			return open(m.home_step_decide(), episodeId ? routes.clearances(episodeId) : routes.looseEnds());
		case 'referral':
			return {
				label: m.home_step_accept(),
				href: placeOf(end) ?? routes.looseEnds(),
				deed: `/api/referrals/${id}/accept`
			};
		case 'sign-off':
			return open(m.home_step_sign(), episodeId ? routes.level(episodeId) : routes.looseEnds());
		case 'mention':
			return open(m.home_step_answer(), placeOf(end) ?? routes.looseEnds());
		case 'visit-unconfirmed':
			return open(m.home_step_call(), episodeId ? routes.patientVisit(episodeId, id) : routes.visits());
		case 'visit-unmarked':
			return open(m.home_step_mark(), episodeId ? routes.patientVisit(episodeId, id) : routes.visits());
		case 'visit-closed-day':
			return open(m.home_step_rebook(), episodeId ? routes.patientVisit(episodeId, id) : routes.visits());
		case 'visit-cancelled':
			return open(m.home_step_rebook(), episodeId ? routes.patientVisits(episodeId) : routes.visits());
		case 'visit-untold':
			return open(m.home_step_call(), routes.untoldVisit(id));
		case 'message-failed':
			return open(m.home_step_call(), routes.failedMessage(id));
		case 'inbound':
			return open(m.home_step_read(), routes.inboundText(id));
	}
}

/** Where more is to be read about a loose end; null where the step leads there already. */
export function placeOf({ kind, id, episodeId, threadId }: LooseEnd): string | null {
	switch (kind) {
		case 'escalation':
		case 'escalation-taken':
		case 'arrival':
		case 'confirm':
		case 'physician-to-tell':
		case 'recheck':
			return routes.escalation(id);
		case 'deviation':
			return episodeId === null ? null : routes.clearances(episodeId);
		case 'refusal':
			return episodeId === null ? null : routes.clearance(episodeId, id);
		case 'clearance':
		case 'clearance-question':
		case 'referral':
		case 'mention':
			if (episodeId === null) {
				return null;
			}
			return threadId === null ? routes.patient(episodeId) : routes.thread(episodeId, threadId);
		case 'visit-cancelled':
		case 'visit-closed-day':
		case 'visit-unmarked':
		case 'visit-unconfirmed':
		case 'visit-untold':
		case 'message-failed':
		case 'inbound':
		case 'sign-off':
		case 'precautions-due':
			return null;
	}
}

/** One press does it; without script it is done on the page of the escalation. */
function onEscalation(id: string, move: 'take' | 'arrive' | 'confirm', label: string): Step {
	return { label, href: routes.escalation(id), deed: `/api/escalations/${id}/${move}` };
}

function open(label: string, href: string): Step {
	return { label, href, deed: null };
}

function mayRecord(role: Role): boolean {
	return can({ kind: 'person', id: '', name: '', role, unitIds: [] }, 'session.record');
}
