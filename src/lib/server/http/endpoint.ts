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

/** What the description of the API says about a handler; read by `openapi.ts`. */
export interface Described {
	permission: Permission;
	body: z.ZodType | null;
	statuses: readonly number[];
	/** Whether a client's key makes it idempotent. */
	stores: boolean;
}

export type Handler = ((event: RequestEvent) => Promise<Response>) & { described: Described };

/** A GET of the JSON API: who, may they, answer. */
export function reading<T>(spec: Reading<T>): Handler {
	const handler = (event: RequestEvent): Promise<Response> =>
		answering(async () => {
			const context = requirePerson(event.locals.context);
			refuseRole(context, spec.permission);
			return jsonResponse(200, await spec.run(context, event));
		});
	const described = { permission: spec.permission, body: null, statuses: [200], stores: false };
	return Object.assign(handler, { described });
}

/** A POST of the JSON API: who, may they, parse, act under the client's key, answer. */
export function writing<B, T>(spec: Writing<B, T>): Handler {
	const handler = (event: RequestEvent): Promise<Response> =>
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
	// A status that the answer decides is 201 for something new and 200 for an addition to what is there.
	const statuses = typeof spec.status === 'function' ? [200, 201] : [spec.status ?? 200];
	const described = { permission: spec.permission, body: spec.body, statuses, stores: true };
	return Object.assign(handler, { described });
}

/** A POST that computes and stores nothing: anybody signed in may ask. */
export function computing<B>(body: z.ZodType<B>, compute: (input: B) => unknown): Handler {
	const handler = writing({
		permission: 'own-account.change',
		body,
		run: (_context, input) => Promise.resolve({ result: compute(input), replayed: false })
	});
	return Object.assign(handler, { described: { ...handler.described, stores: false } });
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
