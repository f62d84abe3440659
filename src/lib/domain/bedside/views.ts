import type { SessionAmendment } from './amended';
import type { KeptBar } from './drawn';
import type { Finding } from './finding';
import type { Reading } from './forms';
import type { Outcome } from './codes';

/** A recorded session as pages and `GET /api/episodes/:id/sessions` show it. */
export interface SessionLine {
	id: string;
	startedAt: string;
	endedAt: string;
	level: number;
	outcome: Outcome;
	limitSet: string;
	limitVersion: string;
	recordedBy: string;
	recordedById: string;
	recordedAt: string;
	activities: { code: string; name: string }[];
	symptoms: string[];
	before: Reading;
	during: Reading[];
	after: Reading;
	findings: (Pick<
		Finding,
		'rule' | 'grade' | 'reading' | 'measured' | 'limit' | 'unit' | 'reason' | 'source'
	> & {
		/** Null for findings of before these were kept. */
		set: Finding['set'] | null;
		version: Finding['version'] | null;
	})[];
	/** The limits beside each value as they judged it; null for sessions of before these were kept. */
	bars: KeptBar[] | null;
	deviation: { reason: string } | null;
	/** What was said about it since, oldest first; empty for one that stands as it was recorded. */
	amendments: SessionAmendment[];
}
