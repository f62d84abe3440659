/** What each browser engine says when a request gets no answer; the standard leaves the words to them. */
const NO_ANSWER = /failed to fetch|networkerror|load failed|network connection was lost/i;

/** Whether what was thrown means that no answer came, rather than a fault in the page. */
export function isUnreached(thrown: unknown): boolean {
	return thrown instanceof TypeError && NO_ANSWER.test(thrown.message);
}
