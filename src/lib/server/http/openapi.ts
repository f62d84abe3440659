import { z } from 'zod';
import { PROBLEMS } from '$lib/domain/core/errors';
import type { Described } from './endpoint';

type Json = Record<string, unknown>;
/** The handlers of one route file, by method. */
export type RouteModule = Partial<Record<'GET' | 'POST' | 'PUT' | 'DELETE', { described?: Described }>>;

/**
 * The description of the JSON API as OpenAPI 3.1, made from the handlers themselves: their addresses from the
 * route files, their bodies from the zod schemas that check them.
 * @param modules route modules by file path, such as `/src/routes/api/visits/[id]/cancel/+server.ts`
 */
export function describeApi(modules: Record<string, RouteModule>, server: string): Json {
	const paths: Record<string, Json> = {};
	for (const [file, module] of Object.entries(modules).toSorted(([a], [b]) => a.localeCompare(b))) {
		const address = addressOf(file);
		for (const [method, handler] of Object.entries(module)) {
			if (handler.described) {
				(paths[address] ??= {})[method.toLowerCase()] = operation(method, address, handler.described);
			}
		}
	}
	return {
		openapi: '3.1.0',
		info: { title: 'Ropewalk', version: '1', license: { name: 'Apache-2.0', identifier: 'Apache-2.0' } },
		servers: [{ url: server }],
		security: [{ cookie: [] }, { token: [] }],
		paths,
		components: {
			securitySchemes: {
				cookie: { type: 'apiKey', in: 'cookie', name: 'ropewalk' },
				token: { type: 'http', scheme: 'bearer' }
			},
			schemas: { Problem: PROBLEM }
		}
	};
}

/** `/src/routes/api/visits/[id]/+server.ts` as `/api/visits/{id}`. */
function addressOf(file: string): string {
	return file
		.replace(/^.*\/routes/, '')
		.replace(/\/\+server\.ts$/, '')
		.replaceAll(/\[(\w+)(=\w+)?\]/g, '{$1}');
}

function operation(method: string, address: string, described: Described): Json {
	const names = [...address.matchAll(/\{(\w+)\}/g)].map((match) => match[1]);
	const parameters: Json[] = names.map((name) => ({
		name,
		in: 'path',
		required: true,
		schema: { type: 'string' }
	}));
	if (described.stores) {
		parameters.push({
			name: 'Idempotency-Key',
			in: 'header',
			required: false,
			description: 'The same key with the same body gives the first answer again.',
			schema: { type: 'string', minLength: 1, maxLength: 200 }
		});
	}
	return {
		operationId: `${method.toLowerCase()}${address.replaceAll(/[^a-zA-Z]+(\w?)/g, (_, c: string) => c.toUpperCase())}`,
		description: `Needs the permission ${described.permission}.`,
		...(parameters.length > 0 && { parameters }),
		...(described.body && {
			requestBody: { required: true, content: { 'application/json': { schema: bodySchema(described.body) } } }
		}),
		responses: responses(described)
	};
}

/** What a client may send; checks that JSON Schema cannot say are left to the server. */
function bodySchema(body: z.ZodType): Json {
	const { $schema: _dialect, ...schema } = z.toJSONSchema(body, { io: 'input', unrepresentable: 'any' });
	return schema;
}

function responses(described: Described): Json {
	const good = described.statuses.map((status) => [
		status,
		{ description: 'Done.', content: { 'application/json': { schema: {} } } }
	]);
	const problem = {
		description: 'A problem.',
		content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } }
	};
	return { ...Object.fromEntries(good), default: problem };
}

const PROBLEM = {
	type: 'object',
	required: ['type', 'title', 'status', 'detail'],
	properties: {
		type: { type: 'string', enum: Object.keys(PROBLEMS), description: 'A stable code.' },
		title: { type: 'string' },
		status: { type: 'integer' },
		detail: { type: 'string' },
		errors: {
			type: 'array',
			items: {
				type: 'object',
				required: ['pointer', 'message'],
				properties: { pointer: { type: 'string' }, message: { type: 'string' } }
			}
		}
	}
};
