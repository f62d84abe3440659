/** What came in by text or by a pressed digit, as administrators see it: from whom, and what it did. */
import type { LogReceiver } from './log';
import { readPatientReply, words } from './reply';

export interface ReceivedLine {
	id: string;
	/** RFC 3339. */
	at: string;
	from: LogReceiver;
	/** What it was taken for, such as `yes` or `take`. */
	understoodAs: string;
	/** What was written, as far as an administrator may read it; see {@link readableWords}. */
	words: string | null;
	/** Why there are none: their time is over, or they may be about a patient. */
	wordsAre: 'shown' | 'removed' | 'private';
	/** Whether a person still has to look at it. */
	waits: boolean;
	/** Who saw to it, where a person had to, and when (RFC 3339). */
	handled: { by: string; at: string } | null;
}

/** A digit that was pressed in a call stands alone, and so does TAKE with nothing but a code. */
const BARE_TAKE = /^(take[ \d]*|\d)$/;

/**
 * The words of a text that is a command and nothing else, which an administrator may read. Anything else may say how
 * somebody is: whoever sees to it reads it where it waits.
 */
export function readableWords(body: string): string | null {
	const isCommand = readPatientReply(body) !== 'other' || BARE_TAKE.test(words(body));
	return isCommand ? body : null;
}
