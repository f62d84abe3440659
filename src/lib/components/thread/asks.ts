/** Which asks of a thread are answered by which entry, and which hang loose. */
import type { LooseEndKind } from '$lib/domain/loose-ends/loose-ends';
import type { EntryLine } from '$lib/domain/referrals/views';

/** An ask of a thread, by the entry that made it. */
export interface ThreadAsk {
	entry: EntryLine;
	/** The entry that answered it; null while it is open, or when it ended without a word in this thread. */
	answer: EntryLine | null;
	/** What it hangs loose as; null once nothing is owed any more. */
	open: OpenAsk | null;
}

export interface OpenAsk {
	kind: Extract<LooseEndKind, 'referral' | 'clearance' | 'escalation'>;
	id: string;
}

/** Whether the thing behind an ask still waits, as its own row says; null where the reader cannot know. */
export type StillWaits = (ask: OpenAsk) => boolean | null;

/**
 * The asks of a thread, in its order. An ask is answered by the first later answer or event about the same thing.
 * Without one it hangs loose, unless its own row says that it has ended some other way, such as lapsed.
 * @param entries oldest first
 */
export function asksOf(entries: readonly EntryLine[], stillWaits: StillWaits): ThreadAsk[] {
	return entries.flatMap((entry, index) => {
		const about = askOf(entry);
		if (about === null) {
			return [];
		}
		const answer = entries.slice(index + 1).find((later) => answers(later, about)) ?? null;
		const open = answer === null && stillWaits(about) !== false ? about : null;
		return [{ entry, answer, open }];
	});
}

function askOf({ kind, ref }: EntryLine): OpenAsk | null {
	if (kind !== 'ask' || ref === null) {
		return null;
	}
	switch (ref.kind) {
		case 'referral':
		case 'clearance':
		case 'escalation':
			return { kind: ref.kind, id: ref.id };
		case 'session':
		case 'visit':
		case 'wound-note':
		case 'line':
		case 'oxygen-note':
			return null;
	}
}

function answers({ kind, ref }: EntryLine, about: OpenAsk): boolean {
	return (kind === 'answer' || kind === 'event') && ref?.kind === about.kind && ref.id === about.id;
}
