import type { SessionBody } from '$lib/domain/bedside/forms';
import { HOSPITAL_NOW } from './hospital';

const MINUTE = 60_000;

export const iso = (at: number) => new Date(at).toISOString();

/** A quiet session of twenty minutes that ended ten minutes before the hospital's now; nothing was done in it. */
export function sessionBody(more: Partial<SessionBody> = {}): SessionBody {
	return {
		context: {
			betaBlocked: true,
			rhythm: 'sinus',
			sternotomy: true,
			level: 5,
			conscious: true,
			followsCommands: true
		},
		before: { hr: 76, sbp: 128, dbp: 74, spo2: 96 },
		during: [],
		after: { hr: 80, sbp: 130, dbp: 74, spo2: 96 },
		symptoms: [],
		activities: [],
		level: 5,
		...sessionAt(HOSPITAL_NOW - 30 * MINUTE),
		...more
	};
}

/** When a session of twenty minutes began and ended. */
export function sessionAt(startedAt: number, minutes = 20) {
	return { startedAt: iso(startedAt), endedAt: iso(startedAt + minutes * MINUTE) };
}

/** Arm exercise to a height that the arm stage permits. */
export const ARMS = {
	activities: [{ code: 'arm-exercise', elevationDeg: 90 }]
} satisfies Partial<SessionBody>;
