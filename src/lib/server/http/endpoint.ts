import type { RequestEvent } from '@sveltejs/kit';
import type { z } from 'zod';
import { can, type Permission } from '$lib/domain/access/can';
import { Problem } from '$lib/domain/core/errors';
import { requirePerson, type Context, type PersonContext } from '../context';
import { digestOf } from '../idempotency';
import { log } from '../log';
import { newId } from '../ids';
import type { Written } from '../write';
import { readJson } from './body';
import { bugResponse, invalidBody, problemResponse } from './problem';

const KEY_PATTERN = /^[\x21-\x7e]{1,200}$/;

interface Reading<T> {
	permission: Permission;
	run(context: PersonContext, event: RequestEvent): Promise<T>;
}

interface Writing<B, T> {
	permission: Permission;
	body: z.ZodType<B>;
	/** 200 where left out; a function where the answer decides. */
	status?: number | ((result: T) => number);
	run(context: PersonContext, input: B, event: RequestEvent): Promise<Written<T>>;
}

/** A GET of the JSON API: who, may they, answer. */
export function reading<T>(spec: Reading<T>) {
	return (event: RequestEvent): Promise<Response> =>
		answering(async () => {
			const context = requirePerson(event.locals.context);
			refuseRole(context, spec.permission);
			return jsonResponse(200, await spec.run(context, event));
		});
}

/** A POST of the JSON API: who, may they, parse, act under the client's key, answer. */
export function writing<B, T>(spec: Writing<B, T>) {
	return (event: RequestEvent): Promise<Response> =>
		answering(async () => {
			const context = requirePerson(event.locals.context);
			refuseRole(context, spec.permission);
			const raw = await readJson(event.request);
			const parsed = spec.body.safeParse(raw);
			if (!parsed.success) {
				throw invalidBody(parsed.error);
			}
			const { result, replayed } = await spec.run(withClientKey(context, event, raw), parsed.data, event);
			const status = typeof spec.status === 'function' ? spec.status(result) : (spec.status ?? 200);
			return jsonResponse(status, result, replayed);
		});
}

/** A POST that computes and stores nothing: anybody signed in may ask. */
export function computing<B>(body: z.ZodType<B>, compute: (input: B) => unknown) {
	return writing({
		permission: 'own-account.change',
		body,
		run: (_context, input) => Promise.resolve({ result: compute(input), replayed: false })
	});
}

/** Run a handler and turn what it throws into problem+json. */
export async function answering(work: () => Promise<Response>): Promise<Response> {
	try {
		return await work();
	} catch (error) {
		if (error instanceof Problem) {
			return problemResponse(error);
		}
		const id = newId();
		log().error({ id, err: error }, 'request failed');
		return bugResponse(id);
	}
}

export function jsonResponse(status: number, body: unknown, replayed = false): Response {
	const headers = new Headers({ 'content-type': 'application/json', 'cache-control': 'no-store' });
	if (replayed) {
		headers.set('idempotency-replayed', 'true');
	}
	return new Response(JSON.stringify(body), { status, headers });
}

/** The role is checked before the body, so that nobody learns the shape of what they may not do. */
function refuseRole(context: Context & { actor: PersonContext['actor'] }, permission: Permission): void {
	if (!can(context.actor, permission)) {
		throw new Problem('not-allowed', `The role ${context.actor.role} may not do that (${permission}).`);
	}
}

function withClientKey(context: PersonContext, event: RequestEvent, body: unknown): PersonContext {
	const key = event.request.headers.get('idempotency-key');
	if (key === null) {
		return context;
	}
	if (!KEY_PATTERN.test(key)) {
		throw new Problem('malformed', 'Idempotency-Key has 1 to 200 visible ASCII characters.');
	}
	return { ...context, key: { key, path: event.url.pathname, digest: digestOf(body) } };
}
