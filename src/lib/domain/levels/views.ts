import type { Advice, Suggestion } from '../bedside/progress';
import type { SignOffKind } from '../bedside/sign-off';
import type { Level } from '../core/codes';

/** What is to be known to decide on a level. Instants are RFC 3339. */
export interface LevelView {
	/** Today's level, which can fall. */
	today: Level;
	/** The highest one reached, which stays. */
	reached: Level;
	/** What the last session speaks for; null where none was recorded. */
	advice: (Advice & { sessionId: string; sessionAt: string; sessionLevel: Level }) | null;
	decisions: {
		id: string;
		from: Level;
		to: Level;
		suggestion: Suggestion | null;
		reason: string | null;
		decidedBy: string;
		decidedAt: string;
		signedBy: string | null;
	}[];
	/** What waits for a senior. */
	signOffs: { id: string; kind: SignOffKind; words: string; askedBy: string; askedAt: string }[];
}
