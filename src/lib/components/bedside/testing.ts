import { limitsFor } from '$lib/domain/bedside/limits/limits';
import type { ReadingField } from './fields';
import { newDraft, newReading, type DraftReading, type SessionDraft } from './draft';
import type { BedsideRecord } from './record';

/** Day 4 after a sternotomy, on a rate-slowing drug, nothing cleared: what tests start from. */
export const RECORD: BedsideRecord = {
	level: 4,
	phase: 'inpatient',
	betaBlocked: true,
	rhythm: 'sinus',
	sternotomy: true,
	clearances: [],
	limits: limitsFor('strict'),
	range: null,
	wordings: []
};

/** A reading with these texts. */
export function typed(
	texts: Partial<Record<ReadingField, string>>,
	rest: Partial<DraftReading> = {}
): DraftReading {
	return { ...newReading(), ...rest, texts };
}

/** An answered session with complete readings, so that a test states only what it is about. */
export function draft(changes: Partial<SessionDraft> = {}): SessionDraft {
	return {
		...newDraft(RECORD, 'key-1'),
		drug: 'yes',
		rhythm: 'sinus',
		startedAt: Date.parse('2026-03-03T09:00:00Z'),
		responds: 'follows',
		before: typed({ sbp: '128', dbp: '74', hr: '76' }),
		after: typed({ sbp: '126', dbp: '72', hr: '80' }),
		...changes
	};
}
