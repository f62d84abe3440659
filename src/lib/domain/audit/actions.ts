/** Everything that is on record, as a closed list: a write names one of these or does not compile. */
export const AUDIT_ACTIONS = [
	'account.created',
	'account.disabled',
	'account.enabled',
	'account.invited',
	'account.password-set',
	'account.signed-in',
	'account.sign-in-failed',
	'account.signed-out',
	'account.token-made',
	'account.token-revoked',
	'account.units-set',
	'clearance.asked',
	'clearance.given',
	'clearance.held',
	'clearance.lapsed',
	'clearance.withdrawn',
	'clearance.withheld',
	'demonstration.loaded',
	'entry.posted',
	'episode.admitted',
	'episode.closed',
	'episode.moved',
	'episode.read',
	'escalation.added-to',
	'escalation.arrived',
	'escalation.chain-step',
	'escalation.passed',
	'escalation.pass-confirmed',
	'escalation.raised',
	'escalation.settled',
	'escalation.taken',
	'escalation.withdrawn',
	'level.decided',
	'limit.ended-for-patient',
	'limit.set-for-patient',
	'mention.seen',
	'message.failed',
	'message.received',
	'message.settled',
	'patient.amended',
	'referral.accepted',
	'referral.asked',
	'referral.closed',
	'referral.declined',
	'referral.withdrawn',
	'session.recorded',
	'sign-off.asked',
	'sign-off.refused',
	'sign-off.signed',
	'system.started',
	'unit.activity-worded',
	'unit.created',
	'unit.limit-changed',
	'unit.limit-set-chosen',
	'visit.attended',
	'visit.booked',
	'visit.cancelled',
	'visit.confirmed',
	'visit.followed-up',
	'visit.missed',
	'visit.reopened'
] as const;
export type AuditAction = (typeof AUDIT_ACTIONS)[number];

/** What an audit row says beside who and when. Identifiers, codes and numbers only: never clinical text. */
export interface AuditEvent {
	action: AuditAction;
	objectKind: string;
	objectId: string;
	episodeId?: string | null;
	outcome?: 'done' | 'refused';
	detail?: Record<string, string | number | boolean | null>;
}
