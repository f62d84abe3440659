/** Who owes the answer to a loose end: the discipline whose colour its frayed end has, and the roles it waits on. */
import type { Person } from '../access/actor';
import { can } from '../access/can';
import {
	ROLES,
	STRAND_OF_ROLE,
	type ClearanceKind,
	type ClinicalRole,
	type Role,
	type Service,
	type Strand
} from '../core/codes';
import type { LooseEnd } from './loose-ends';

type Owed = Pick<LooseEnd, 'kind' | 'code'>;

/**
 * The discipline that owes the answer. An escalation is owed by nursing until somebody has it, and by the
 * holder's discipline from then on.
 * @param holder the role of whoever has it, where that is known
 */
export function owedBy({ kind, code }: Owed, holder: ClinicalRole | null = null): Strand {
	switch (kind) {
		case 'escalation':
			return 'nursing';
		case 'escalation-taken':
		case 'arrival':
		case 'confirm':
		case 'recheck':
		case 'physician-to-tell':
			return holder === null ? 'nursing' : STRAND_OF_ROLE[holder];
		case 'precautions-due':
			return 'medical';
		case 'clearance':
		case 'deviation':
			return code === 'oral-intake' ? 'therapy' : 'medical';
		case 'clearance-question':
		case 'refusal':
			return holder === null ? 'therapy' : STRAND_OF_ROLE[holder];
		case 'referral':
		case 'sign-off':
			return 'therapy';
		case 'mention':
			return STRAND_OF_ROLE[code as ClinicalRole] ?? 'patient';
		case 'visit-cancelled':
		case 'visit-closed-day':
		case 'visit-unmarked':
		case 'visit-unconfirmed':
		case 'visit-untold':
		case 'message-failed':
		case 'inbound':
			return 'patient';
	}
}

/** The roles that may give the answer, in the order of `ROLES`; what somebody holds already is theirs alone. */
export function rolesAsked({ kind, code }: Owed): Role[] {
	switch (kind) {
		case 'escalation':
			return ROLES.filter((role) => can(anyone(role), 'escalation.take'));
		case 'precautions-due':
		case 'clearance':
		case 'deviation':
			return ROLES.filter((role) =>
				can(anyone(role), 'clearance.decide', { clearanceKind: code as ClearanceKind })
			);
		case 'referral':
			return ROLES.filter((role) => can(anyone(role), 'referral.answer', { service: code as Service }));
		case 'visit-cancelled':
		case 'visit-closed-day':
		case 'visit-unconfirmed':
		case 'visit-untold':
		case 'message-failed':
		case 'inbound':
			return ['coordinator'];
		case 'visit-unmarked':
			return ['therapist', 'coordinator'];
		case 'sign-off':
			return ['therapist'];
		case 'mention':
		case 'escalation-taken':
		case 'arrival':
		case 'confirm':
		case 'recheck':
		case 'physician-to-tell':
		case 'clearance-question':
		case 'refusal':
			return [];
	}
}

/** Somebody of a role, to ask what the role may do. */
function anyone(role: Role): Person {
	return { kind: 'person', id: '', name: '', role, unitIds: [] };
}
