/**
 * The errors that a person or a program can cause, each with a stable code (the `type` of problem+json), a status
 * and a safe text. Anything else that is thrown is a bug: it is logged with an id and answered without detail.
 */
export const PROBLEMS = {
	malformed: { status: 400, title: 'The request cannot be read' },
	'not-signed-in': { status: 401, title: 'Nobody is signed in' },
	'sign-in-failed': { status: 401, title: 'E-mail address or password is wrong' },
	'foreign-origin': { status: 403, title: 'The request comes from another site' },
	'wrong-signature': { status: 403, title: 'The signature does not fit' },
	'not-allowed': { status: 403, title: 'This role may not do that' },
	'not-found': { status: 404, title: 'Not there, or not yours to see' },
	'no-such-method': { status: 405, title: 'The method is not known here' },
	'wrong-state': { status: 409, title: 'The state does not allow it' },
	'already-asked': { status: 409, title: 'It is already asked' },
	'already-given': { status: 409, title: 'It is already given' },
	'already-taken': { status: 409, title: 'Somebody has it already' },
	'evidence-changed': { status: 409, title: 'Something new is on record' },
	'clearance-needed': { status: 409, title: 'A clearance is needed first' },
	'already-admitted': { status: 409, title: 'The patient has an open episode' },
	'visit-overlaps': { status: 409, title: 'The patient has another visit at that time' },
	'place-full': { status: 409, title: 'All places of that time are taken' },
	'bed-in-use': { status: 409, title: 'The bed is in use' },
	'in-flight': { status: 409, title: 'The first request with this key is still running' },
	'link-ended': { status: 410, title: 'This link has ended' },
	'too-large': { status: 413, title: 'The request is too large' },
	'wrong-type': { status: 415, title: 'The body is not JSON' },
	invalid: { status: 422, title: 'Some values are not valid' },
	'idempotency-mismatch': { status: 422, title: 'The key was used with another body' },
	'too-many': { status: 429, title: 'Too many requests' },
	'not-ready': { status: 503, title: 'Not ready' }
} as const;
export type ProblemCode = keyof typeof PROBLEMS;

export interface FieldError {
	/** JSON Pointer into the body, such as `/readings/0/hr`; empty for the whole. */
	pointer: string;
	message: string;
}

export class Problem extends Error {
	readonly status: number;

	/**
	 * @param code one of {@link PROBLEMS}
	 * @param detail what happened in plain words: the field, the value, the limit, the state
	 * @param extra members added to the answer, such as who has it and since when
	 */
	constructor(
		readonly code: ProblemCode,
		readonly detail: string = PROBLEMS[code].title,
		readonly extra: { errors?: FieldError[]; retryAfterSeconds?: number } & Record<string, unknown> = {}
	) {
		super(detail);
		this.name = 'Problem';
		this.status = PROBLEMS[code].status;
	}
}

/** Shorthand for what is missing or hidden; both look the same to the caller. */
export function notFound(what: string): Problem {
	return new Problem('not-found', `There is no such ${what}, or it is not yours to see.`);
}

/** Shorthand for one field that fails a check which the schema alone cannot make. */
export function invalidField(pointer: string, message: string): Problem {
	return new Problem('invalid', message, { errors: [{ pointer, message }] });
}
