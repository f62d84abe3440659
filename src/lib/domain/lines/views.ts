import type { LineKind } from './codes';

/** One line of an episode: noted in, and noted out once it is. The same kind put in again is another one. */
export interface LineNote {
	id: string;
	kind: LineKind;
	inBy: string;
	inAt: string;
	/** Both null while it is in. */
	outBy: string | null;
	outAt: string | null;
}

/** The oxygen a patient is on: the flow in L/min, 0 for none, and the instant it was said of. */
export interface StandingOxygen {
	lpm: number;
	at: string;
}

/** The same with who said it, in a note or by a session's readings. */
export interface SaidOxygen extends StandingOxygen {
	by: string;
}
