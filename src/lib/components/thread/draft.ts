/** What is typed and not yet posted, kept for one thread while the tab lives, so that a reload costs nothing. */
export interface Draft {
	body: string;
	/** The person to whom the question is put; empty for nobody. */
	mention: string;
	/**
	 * The last try that got no answer. Nobody knows whether it arrived, so the same words are sent again under the
	 * same key, and other words under another.
	 */
	tried: { body: string; mention: string; key: string } | null;
}

export const NO_DRAFT: Draft = { body: '', mention: '', tried: null };

/** The part of `Storage` that is used. */
export type Store = Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>;

/** The key under which to post: the one of the try that is repeated word for word, or the fresh one. */
export function keyFor(
	{ body, mention }: Pick<Draft, 'body' | 'mention'>,
	tried: Draft['tried'],
	fresh: string
): string {
	const same = tried !== null && tried.body.trim() === body.trim() && tried.mention === mention;
	return same ? tried.key : fresh;
}

/** Read what was kept; what cannot be read is no draft. */
export function loadDraft(store: Store, threadId: string): Draft {
	try {
		const kept: unknown = JSON.parse(store.getItem(nameOf(threadId)) ?? 'null');
		return isDraft(kept) ? kept : NO_DRAFT;
	} catch {
		return NO_DRAFT;
	}
}

/** The kept draft together with what was entered before the page was ready: nothing is lost, nothing stands twice. */
export function joined(kept: Draft, early: Pick<Draft, 'body' | 'mention'>): Draft {
	const parts = kept.body === early.body ? [kept.body] : [kept.body, early.body];
	return { ...kept, body: parts.filter(Boolean).join('\n'), mention: early.mention || kept.mention };
}

/** Keep a draft, or forget it once there is nothing left of it. A browser that keeps nothing is no reason to fail. */
export function keepDraft(store: Store, threadId: string, draft: Draft): void {
	try {
		if (draft.body === '' && draft.tried === null) {
			store.removeItem(nameOf(threadId));
		} else {
			store.setItem(nameOf(threadId), JSON.stringify(draft));
		}
	} catch {
		// The words are still in the field.
	}
}

function nameOf(threadId: string): string {
	return `ropewalk-draft-${threadId}`;
}

function isDraft(value: unknown): value is Draft {
	const draft = value as Partial<Draft> | null;
	const tried = draft?.tried;
	const triedFits =
		tried === null ||
		(typeof tried?.body === 'string' &&
			typeof tried.mention === 'string' &&
			typeof tried.key === 'string' &&
			tried.key !== '');
	return typeof draft?.body === 'string' && typeof draft.mention === 'string' && triedFits;
}
