import { CLINICAL_ROLES, type ClearanceKind, type Role, type Service } from '../core/codes';
import { isSenior } from '../bedside/sign-off';
import type { Person } from './actor';

/**
 * Every permission by name. `can()` is the only place that decides, and what it does not know it refuses.
 */
export const PERMISSIONS = [
	'episode.read',
	'episode.admit',
	'episode.move',
	'episode.close',
	'contact.read',
	'contact.amend',
	'operation.record',
	'referral.create',
	'referral.answer',
	'referral.close',
	'referral.withdraw',
	'thread.read',
	'entry.write',
	'clearance.ask',
	'clearance.decide',
	'clearance.withdraw',
	'precautions.review',
	'session.read',
	'session.record',
	'wound.note',
	'line.note',
	'limit.set-for-patient',
	'range.prescribe',
	'limit.change',
	'level.decide',
	'sign-off.decide',
	'alarm.read',
	'escalation.read',
	'escalation.raise',
	'escalation.take',
	'escalation.withdraw',
	'visit.read',
	'visit.plan',
	'visit.attend',
	'closed-day.keep',
	'stray-text.settle',
	'message-log.read',
	'message.resend',
	'account.manage',
	'audit.read',
	'own-account.change'
] as const;
export type Permission = (typeof PERMISSIONS)[number];

/** What a permission can depend on beside the role. Left out, the answer is whether the role ever may. */
export interface Subject {
	unitId?: string;
	service?: Service;
	clearanceKind?: ClearanceKind;
}

/** May this person do that to this subject? Units are part of the question: outside them the answer is no. */
export function can(person: Person, permission: Permission, subject: Subject = {}): boolean {
	if (subject.unitId !== undefined && !person.unitIds.includes(subject.unitId)) {
		return false;
	}
	if (permission === 'sign-off.decide' || permission === 'range.prescribe') {
		return isSenior(person) && roleMay(person.role, permission, subject);
	}
	return roleMay(person.role, permission, subject);
}

function roleMay(role: Role, permission: Permission, subject: Subject): boolean {
	const clinical = isClinical(role);
	switch (permission) {
		case 'episode.read':
		case 'visit.read':
		case 'thread.read':
			return clinical || role === 'coordinator';
		case 'episode.admit':
			return among(role, 'coordinator', 'nurse', 'physician', 'surgeon');
		case 'episode.move':
			return among(role, 'coordinator', 'nurse');
		case 'episode.close':
			return among(role, 'coordinator', 'nurse', 'physician');
		case 'contact.read':
			return clinical || role === 'coordinator';
		case 'contact.amend':
			return among(role, 'coordinator', 'nurse');
		case 'operation.record':
			return among(role, 'coordinator', 'physician', 'surgeon');
		case 'referral.create':
		case 'referral.withdraw':
			return among(role, 'surgeon', 'physician');
		case 'referral.answer':
			return subject.service === undefined ? servesAny(role) : serves(role, subject.service);
		case 'referral.close':
			return among(role, 'surgeon', 'physician') || servesAny(role);
		case 'entry.write':
		case 'session.read':
		case 'escalation.read':
		case 'escalation.raise':
		case 'escalation.withdraw':
			return clinical;
		case 'clearance.ask':
			return among(role, 'therapist', 'speech-therapist', 'nurse', 'physician');
		case 'clearance.decide':
		case 'clearance.withdraw':
			return subject.clearanceKind === undefined
				? among(role, 'surgeon', 'physician', 'speech-therapist')
				: decides(role, subject.clearanceKind);
		// Ending the precautions is the surgeon's, who need not wait to be asked.
		case 'precautions.review':
			return role === 'surgeon';
		case 'wound.note':
			return clinical;
		// Lines, drains and oxygen: those who put them in, take them out and walk with them.
		case 'line.note':
			return among(role, 'nurse', 'therapist', 'physician', 'surgeon');
		case 'session.record':
			return among(role, 'therapist', 'speech-therapist', 'nurse', 'physician');
		case 'limit.set-for-patient':
			return among(role, 'physician', 'surgeon');
		// The programme's range replaces the general ceilings, so a junior does not set it.
		case 'range.prescribe':
			return among(role, 'physician', 'surgeon', 'therapist');
		case 'limit.change':
			return role === 'admin';
		case 'level.decide':
			return among(role, 'therapist', 'physician');
		case 'sign-off.decide':
			return among(role, 'therapist', 'speech-therapist', 'nurse', 'physician', 'surgeon');
		case 'escalation.take':
			return among(role, 'nurse', 'physician', 'surgeon');
		case 'visit.plan':
			return among(role, 'coordinator', 'therapist');
		case 'visit.attend':
			return among(role, 'coordinator', 'therapist', 'nurse');
		case 'closed-day.keep':
			return among(role, 'coordinator', 'admin');
		// A text that is filed under no patient: whoever keeps the contacts finds out whose it is.
		case 'stray-text.settle':
			return role === 'coordinator';
		case 'message-log.read':
		case 'message.resend':
		case 'account.manage':
		case 'audit.read':
			return role === 'admin';
		// Where and since when nobody comes is for everybody of the unit; what it is about is not.
		case 'alarm.read':
		case 'own-account.change':
			return true;
		default:
			return false;
	}
}

/** The surgeon decides every kind; local policy delegates a few. */
function decides(role: Role, kind: ClearanceKind): boolean {
	if (role === 'surgeon') {
		return true;
	}
	if (role === 'physician') {
		return kind === 'corridor' || kind === 'stairs' || kind === 'treadmill';
	}
	return role === 'speech-therapist' && kind === 'oral-intake';
}

function serves(role: Role, service: Service): boolean {
	return service === 'speech-therapy' ? role === 'speech-therapist' : role === 'therapist';
}

function servesAny(role: Role): boolean {
	return role === 'therapist' || role === 'speech-therapist';
}

function isClinical(role: Role): boolean {
	return (CLINICAL_ROLES as readonly Role[]).includes(role);
}

function among(role: Role, ...roles: Role[]): boolean {
	return roles.includes(role);
}
