import type { ClearanceLine } from '../episodes/views';
import type { ClearanceEvidence, ClearanceLimits } from './forms';
import type { EvidenceNews } from './news';

/** One clearance as the decider sees it and as `GET /api/clearances/:id` answers it. */
export interface ClearanceView extends ClearanceLine {
	episodeId: string;
	threadId: string | null;
	/** Who asked may take the ask back. */
	askedById: string;
	/** The limits that whoever asked proposed; null for none. */
	proposed: ClearanceLimits | null;
	/** It is not cleared, and whoever asked has not said that they saw it. */
	unseen: boolean;
	/** As it is now while it can be decided; once that is over, as it was at the decision. */
	evidence: ShownEvidence;
	/** As it was when the ask was made. */
	askedOn: ShownEvidence;
	/** As it was when the latest decision was made; null before any. */
	decidedOn: ShownEvidence | null;
	/** What stands in the evidence and did not at the ask; null for nothing, and once it is decided. */
	news: EvidenceNews | null;
	/** What this answer shows, for the decision to say what it was made on. */
	shown: string;
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

/** Evidence as a person may see it: who may not read sessions or calls for help gets null instead of them. */
export type ShownEvidence = Omit<ClearanceEvidence, 'sessions' | 'escalations'> & {
	sessions: ClearanceEvidence['sessions'] | null;
	escalations?: ClearanceEvidence['escalations'] | null;
};
