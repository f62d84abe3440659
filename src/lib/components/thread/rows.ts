import type { EntryLine } from '$lib/domain/referrals/views';
import type { StrandName } from '../rope/strands';
import type { ThreadAsk } from './asks';

/** One entry as the rope shows it. */
export interface ThreadRow {
	key: string;
	entry: EntryLine;
	/** What became of it, where it asks something. */
	ask: ThreadAsk | null;
	/** It came while the page was open, from somebody else. */
	isNew: boolean;
}

/**
 * What others said since the page was opened; one's own words are never new.
 * @param openedAt the number of the newest entry when the page was opened
 */
export function newsOf(entries: readonly EntryLine[], openedAt: number, viewerId: string): EntryLine[] {
	return entries.filter(({ seq, author }) => seq > openedAt && author?.id !== viewerId);
}

/** The entries of a thread as rows. */
export function rowsOf(
	entries: readonly EntryLine[],
	asks: readonly ThreadAsk[],
	news: readonly EntryLine[]
): ThreadRow[] {
	return entries.map((entry) => ({
		key: entry.id,
		entry,
		ask: asks.find((ask) => ask.entry.id === entry.id) ?? null,
		isNew: news.includes(entry)
	}));
}

/** What merely happened, such as a visit that was attended: read in passing, in little room. */
export function isPassing({ entry, ask, isNew }: ThreadRow): boolean {
	return entry.kind === 'event' && entry.asked.length === 0 && ask === null && !isNew;
}

/** A way beside the rope, from row to row; `to` is null while it hangs loose. */
export interface AskWay {
	from: string;
	to: string | null;
	strand: StrandName;
}

/** The strands that leave the rope: tied in again at their answer, frayed while they are open. */
export function waysOf(asks: readonly ThreadAsk[]): AskWay[] {
	return asks
		.filter(({ answer, open }) => answer !== null || open !== null)
		.map(({ entry, answer }) => ({ from: entry.id, to: answer?.id ?? null, strand: entry.strand }));
}
