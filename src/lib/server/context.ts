import type { Actor, Person } from '$lib/domain/access/actor';
import { Problem } from '$lib/domain/core/errors';
import { now } from './clock';

/** Who asks, when, from where, and with which key: handed to every action. */
export interface Context<A extends Actor | null = Actor | null> {
	actor: A;
	/** One instant for the whole request, milliseconds UTC. */
	now: number;
	/** The caller's network address; null for the system's own work. */
	address: string | null;
	/** The client's key for this write, or null where none was sent. */
	key: WriteKey | null;
}

export type PersonContext = Context<Person>;

export interface WriteKey {
	key: string;
	path: string;
	/** SHA-256 over the body in canonical form. */
	digest: string;
}

/** A context for work that no request asked for. */
export function systemContext(
	id: 'chain' | 'lapses' | 'reminders' | 'setup' | 'demonstration' | 'sign-ins',
	at: number = now()
): Context<{ kind: 'system'; id: typeof id }> {
	return { actor: { kind: 'system', id }, now: at, address: null, key: null };
}

/** Narrow to a signed-in person or refuse with 401. */
export function requirePerson(context: Context): PersonContext {
	const { actor } = context;
	if (actor?.kind !== 'person') {
		throw new Problem('not-signed-in');
	}
	return { ...context, actor };
}
