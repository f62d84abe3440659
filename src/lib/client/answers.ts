import type { ClearanceView } from '$lib/domain/clearances/views';
import type { LooseEnd } from '$lib/domain/loose-ends/loose-ends';
import type { EntryLine, ThreadView } from '$lib/domain/referrals/views';
import { getJson } from './api';

/** How an ask ended that somebody waited for. */
export interface Answer {
	end: LooseEnd;
	/** Who answered; null where it ended without a person's word, or none could be read. */
	by: string | null;
}

/** The asks that a person waits for and that are answered with words; a call for help tells its own story. */
const ANSWERED: readonly LooseEnd['kind'][] = ['clearance', 'clearance-question', 'referral', 'mention'];

/** What was waited for before and is not any more. */
export function endedSince(before: readonly LooseEnd[], now: readonly LooseEnd[]): LooseEnd[] {
	const open = new Set(now.map(({ kind, id }) => `${kind} ${id}`));
	return before.filter(({ kind, id }) => ANSWERED.includes(kind) && !open.has(`${kind} ${id}`));
}

/** Ask the record by whom an ask was answered. It never fails: without an answer nobody is named. */
export async function answerOf(end: LooseEnd): Promise<Answer> {
	try {
		return { end, by: await answererOf(end) };
	} catch {
		return { end, by: null };
	}
}

async function answererOf({ kind, id, threadId }: LooseEnd): Promise<string | null> {
	if (kind === 'clearance') {
		return (await getJson<ClearanceView>(`/api/clearances/${id}`)).decidedBy;
	}
	if (threadId === null) {
		return null;
	}
	const { referral, items } = await getJson<ThreadView>(`/api/threads/${threadId}?limit=200`);
	return kind === 'referral' ? (referral.decidedBy?.name ?? null) : lastSpeaker(items);
}

/** Of a question put to a person the newest entry is the answer. */
function lastSpeaker(items: readonly EntryLine[]): string | null {
	return items.at(-1)?.author?.name ?? null;
}
