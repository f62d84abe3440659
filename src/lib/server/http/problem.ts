import { Problem, PROBLEMS, type FieldError } from '$lib/domain/core/errors';
import type { z } from 'zod';

/** An error as `application/problem+json` (RFC 9457). `type` is the stable code. */
export function problemResponse(problem: Problem): Response {
	const { retryAfterSeconds, ...extra } = problem.extra;
	const headers = new Headers({ 'content-type': 'application/problem+json', 'cache-control': 'no-store' });
	if (retryAfterSeconds !== undefined) {
		headers.set('retry-after', String(retryAfterSeconds));
	}
	const body = {
		type: problem.code,
		title: PROBLEMS[problem.code].title,
		status: problem.status,
		detail: problem.detail,
		...extra
	};
	return new Response(JSON.stringify(body), { status: problem.status, headers });
}

/** An unexpected error: logged elsewhere under this id, answered without any detail. */
export function bugResponse(id: string): Response {
	const body = {
		type: 'internal',
		title: 'Something went wrong on our side',
		status: 500,
		detail: `Nothing was changed. Please quote ${id} when you report it.`
	};
	return new Response(JSON.stringify(body), {
		status: 500,
		headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store' }
	});
}

/** Zod's issues as field errors with JSON Pointers (RFC 6901). */
export function invalidBody(error: z.ZodError): Problem {
	const errors = error.issues.map((issue) => ({
		pointer: issue.path
			.map((part) => `/${String(part).replaceAll('~', '~0').replaceAll('/', '~1')}`)
			.join(''),
		message: issue.message
	}));
	const [first] = errors;
	return new Problem('invalid', first && detailOf(first), { errors });
}

/** Our own messages name their field; those that zod makes do not, and get the pointer before them. */
function detailOf({ pointer, message }: FieldError): string {
	return /^(Invalid|Unrecognized|Too )/.test(message) ? `${pointer || 'body'}: ${message}` : message;
}
