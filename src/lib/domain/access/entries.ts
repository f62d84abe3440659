import type { RefKind } from '../referrals/entries';
import type { Person } from './actor';
import { can, type Permission } from './can';

/** What an entry tells of its subject is read by whoever may read the subject. */
const NEEDS: Record<RefKind, Permission> = {
	referral: 'thread.read',
	clearance: 'thread.read',
	visit: 'visit.read',
	session: 'session.read',
	escalation: 'escalation.read',
	'wound-note': 'session.read',
	line: 'session.read',
	'oxygen-note': 'session.read'
};

/**
 * May this person read what an entry says? A bedside session writes its readings and findings into the thread, a
 * call for help its reasons: a thread is no second way to them.
 * @param about what the entry points at; null for talk
 */
export function mayReadEntry(person: Person, unitId: string, about: RefKind | null): boolean {
	return can(person, about === null ? 'thread.read' : NEEDS[about], { unitId });
}
