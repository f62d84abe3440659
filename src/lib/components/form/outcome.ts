/**
 * What became of a form that was sent and got no answer of its own: the sign-in had run out, the network was
 * gone, the server failed, or an earlier try had arrived after all. None of them may cost what was typed.
 */
export type Outcome =
	| { kind: 'sign-in'; href: string }
	/** No answer came; `offline` when the device itself says that it has no network. */
	| { kind: 'unreached'; offline: boolean }
	/** It was sent before with other words, and those have arrived; what stands in the form now has not. */
	| { kind: 'arrived' }
	| { kind: 'refused'; message: string };

/** The code of a write that came before under the same key, and said something else. */
const CHANGED = 'idempotency-mismatch';

/** The part of an action's result that decides. */
export type ActionAnswer =
	| { type: 'redirect'; location: string }
	| { type: 'error'; status?: number; error: { message?: string } }
	| { type: 'success' | 'failure'; data?: Record<string, unknown> };

/**
 * The outcome to tell of, or `null` when the answer speaks for itself: a success, errors beside fields, or a
 * redirect to where the person is meant to go. An expired sign-in shows as 401 or as a redirect to `signIn`.
 * @param offline whether the device says that it has no network
 */
export function outcomeOf(answer: ActionAnswer, signIn: string, offline: boolean): Outcome | null {
	if (answer.type === 'redirect') {
		const expired = answer.location.split('?')[0] === signIn;
		return expired ? { kind: 'sign-in', href: answer.location } : null;
	}
	if (answer.type !== 'error') {
		const arrived = answer.type === 'failure' && answer.data?.code === CHANGED;
		return arrived ? { kind: 'arrived' } : null;
	}
	if (answer.status === 401) {
		return { kind: 'sign-in', href: signIn };
	}
	// What was thrown here, and not said by the server, is no answer at all, whatever status the form library gives
	// it: nobody knows whether it arrived, and the key makes it safe to ask again.
	const unanswered = answer.status === undefined || answer.error instanceof Error;
	if (unanswered || (answer.status ?? 0) >= 500) {
		return { kind: 'unreached', offline: offline && unanswered };
	}
	return { kind: 'refused', message: answer.error.message ?? '' };
}
