/**
 * What is typed at the bedside stays in the tab until it is recorded: a reload, a dead battery of the access point
 * or a wrong tap on 'back' must not cost a reading. It is kept per person and patient, so that the next person at
 * a shared device is not shown it.
 */
import type { EscalationDraft } from '$lib/domain/escalations/draft';
import { readDraft, type SessionDraft } from './draft';

const draftName = (userId: string, episodeId: string) => `bedside:${userId}:${episodeId}`;
const callName = (userId: string, episodeId: string) => `call:${userId}:${episodeId}`;

/** The session that was being written, or null. */
export function keptDraft(userId: string, episodeId: string): SessionDraft | null {
	return readDraft(read(draftName(userId, episodeId)));
}

/** Keep the session; null once it is recorded. */
export function keepDraft(userId: string, episodeId: string, draft: SessionDraft | null): void {
	write(draftName(userId, episodeId), draft);
}

/** Hand the words of a call over to its page, without an address carrying them. */
export function handOverCall(userId: string, episodeId: string, call: EscalationDraft): void {
	write(callName(userId, episodeId), call);
}

/** The words that were handed over, once; null when there are none. */
export function takeCall(userId: string, episodeId: string): EscalationDraft | null {
	const name = callName(userId, episodeId);
	const kept = read(name);
	write(name, null);
	try {
		return JSON.parse(kept ?? 'null') as EscalationDraft | null;
	} catch {
		return null;
	}
}

/** Storage may be closed to us or full; then only what is on the screen is there. */
function read(name: string): string | null {
	try {
		return sessionStorage.getItem(name);
	} catch {
		return null;
	}
}

function write(name: string, value: unknown): void {
	try {
		if (value === null) {
			sessionStorage.removeItem(name);
		} else {
			sessionStorage.setItem(name, JSON.stringify(value));
		}
	} catch {
		// Nothing to do: see `read`.
	}
}
