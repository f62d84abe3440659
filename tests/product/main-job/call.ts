import { expect } from 'vitest';
import type { Role } from './makers';

/** One call of the main job that changes something, and how to bring about what it needs. */
export interface Call {
	name: string;
	by: Role;
	/** Makes what the call is about, and gives its address. */
	path: () => Promise<string>;
	body: Body | (() => Body);
	/** What it answers, to the last field: nothing more, nothing else. */
	answer: { status: 200 | 201; body: Body };
	/** Another body that the same call would take; null where it takes none. */
	other: Body | null;
	/** What it does not take; a field that nobody knows where left out. */
	bad?: Body;
	/** The same address in a state that does not allow the call; null where every state does. */
	wrong: (() => Promise<string>) | null;
}

export type Body = Record<string, unknown>;

export const SOME = expect.any(String) as string;
export const INSTANT = expect.stringMatching(/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{3}Z$/) as string;
/** What a move answers: which thing it was, and its state from now on. */
export const now = (state: string): Call['answer'] => ({ status: 200, body: { id: SOME, state } });
