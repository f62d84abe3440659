import type { Role } from '../core/codes';

/** Who does something. Every audit row names one of these. */
export type Actor = Person | PatientActor | SystemActor | LinkHolder;

export interface Person {
	kind: 'person';
	id: string;
	name: string;
	role: Role;
	unitIds: readonly string[];
	/** Goes beyond the cautious figure, and signs for juniors who did. */
	senior?: boolean;
}

/** The patient, known by the telephone number that answered. */
export interface PatientActor {
	kind: 'patient';
	id: string;
}

/** The hospital's own clockwork: chain, lapses, reminders, demonstration. */
export interface SystemActor {
	kind: 'system';
	id: 'chain' | 'lapses' | 'reminders' | 'setup' | 'demonstration' | 'sign-ins';
}

/** Somebody who holds the secret link of one escalation: that person, for that one deed, without a sign-in. */
export interface LinkHolder {
	kind: 'link';
	person: Person;
	escalationId: string;
}

/** The person behind the deed, where there is one. */
export function personOf(actor: Actor): Person | null {
	switch (actor.kind) {
		case 'person':
			return actor;
		case 'link':
			return actor.person;
		case 'patient':
		case 'system':
			return null;
	}
}
