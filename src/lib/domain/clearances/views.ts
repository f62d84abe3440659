import type { ClearanceLine } from '../episodes/views';
import type { ClearanceEvidence } from './forms';

/** One clearance as the decider sees it and as `GET /api/clearances/:id` answers it. */
export interface ClearanceView extends ClearanceLine {
	episodeId: string;
	threadId: string | null;
	/** Who asked may take the ask back. */
	askedById: string;
	/** As it was when the ask was made. */
	evidence: ShownEvidence;
	/** As it was when the latest decision was made; null before any. */
	decidedOn: ShownEvidence | null;
	/** What deciders asked back, the oldest first; of these at most the last one is open. */
	questions: ClearanceQuestion[];
}

/** A question of a decider to whoever asked. */
export interface ClearanceQuestion {
	id: string;
	question: string;
	askedBy: string;
	askedAt: string;
	answer: string | null;
	answeredBy: string | null;
	answeredAt: string | null;
}

/** Evidence as a person may see it: who may not read sessions gets null instead of them. */
export type ShownEvidence = Omit<ClearanceEvidence, 'sessions'> & {
	sessions: ClearanceEvidence['sessions'] | null;
};
