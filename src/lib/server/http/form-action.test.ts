import { isRedirect, redirect, type RequestEvent } from '@sveltejs/kit';
import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { Problem, invalidField } from '$lib/domain/core/errors';
import type { Context, PersonContext } from '../context';
import { formAction, openFormAction } from './form-action';

const person = { kind: 'person', id: 'p1', name: 'Una Fairlead', role: 'nurse', unitIds: [] } as const;
const schema = z.strictObject({
	note: z.string().min(3, 'note has at least 3 characters.'),
	password: z.string()
});

interface Posting {
	fields?: Record<string, string>;
	search?: string;
	actor?: Context['actor'];
}

const ANSWERED = new Map<RequestEvent, Record<string, string>>();

function posting({ fields = {}, search = '', actor = person }: Posting = {}): RequestEvent {
	const url = new URL(`http://127.0.0.1/account${search}`);
	const body = new URLSearchParams({ note: 'dry and clean', password: 'hush', ...fields });
	const headers: Record<string, string> = {};
	const event = {
		url,
		request: new Request(url, { method: 'POST', body }),
		locals: { context: { actor, now: 1, address: null, key: null } },
		setHeaders: (given: Record<string, string>) => Object.assign(headers, given)
	} as unknown as RequestEvent;
	ANSWERED.set(event, headers);
	return event;
}

/** Run an action whose work answers or throws, and give back what the page would get. */
async function answerOf(work: (context: PersonContext) => Promise<string>, given: Posting = {}) {
	const event = posting(given);
	const answer = await formAction({ schema, secrets: ['password'], run: work })(event);
	const failed = 'status' in answer;
	const { form } = failed ? (answer.data as { form: { valid: boolean } }) : answer;
	return { status: failed ? answer.status : 200, form, headers: ANSWERED.get(event) };
}

describe('a form action', () => {
	it('tells what was done and never sends a secret back', async () => {
		const { status, form } = await answerOf(() => Promise.resolve('Noted.'));
		expect(status).toBe(200);
		expect(form).toMatchObject({
			valid: true,
			message: 'Noted.',
			data: { note: 'dry and clean', password: '' }
		});
	});

	it('keeps what was typed when it does not fit, and does nothing', async () => {
		let ran = false;
		const work = () => {
			ran = true;
			return Promise.resolve('');
		};
		const { status, form } = await answerOf(work, { fields: { note: 'no' } });
		expect({ status, ran }).toEqual({ status: 422, ran: false });
		expect(form).toMatchObject({
			valid: false,
			data: { note: 'no', password: '' },
			errors: { note: ['note has at least 3 characters.'] }
		});
	});

	it.each([
		['a state', new Problem('wrong-state', 'It is closed.'), 409, { message: 'It is closed.' }],
		['a role', new Problem('not-allowed', 'Nurses may not.'), 403, { message: 'Nurses may not.' }],
		['a field', invalidField('/note', 'note is known.'), 422, { errors: { note: ['note is known.'] } }],
		['a field of a list', invalidField('/note/2', 'third.'), 422, { errors: { note: ['third.'] } }],
		['no field of the form', invalidField('/unit', 'unit is gone.'), 422, { message: 'unit is gone.' }]
	])('says why when %s stands in the way', async (_, problem, status, shown) => {
		const answer = await answerOf(() => Promise.reject(problem));
		expect(answer.status).toBe(status);
		expect(answer.form).toMatchObject({ valid: false, ...shown });
	});

	it('tells how long to wait', async () => {
		const problem = new Problem('too-many', 'Wait.', { retryAfterSeconds: 7 });
		const { status, headers } = await answerOf(() => Promise.reject(problem));
		expect({ status, headers }).toEqual({ status: 429, headers: { 'retry-after': '7' } });
	});

	it('uses the words of the page for a problem where it has some', async () => {
		const action = formAction({
			schema,
			words: { 'wrong-state': () => 'Too late.' },
			run: () => Promise.reject(new Problem('wrong-state'))
		});
		expect(await action(posting())).toMatchObject({ data: { form: { message: 'Too late.' } } });
	});

	it('tells words that were changed after they had arrived from any other refusal', async () => {
		const action = formAction({
			schema,
			run: () => Promise.reject(new Problem('idempotency-mismatch'))
		});
		const form = { message: expect.stringContaining('An earlier version has arrived') as string };
		expect(await action(posting())).toMatchObject({
			status: 422,
			data: { code: 'idempotency-mismatch', form: { ...form, data: { note: 'dry and clean' } } }
		});
	});

	it('asks for a sign-in instead of losing what was typed', async () => {
		const given = { actor: null, search: '?/change', fields: { note: 'no', key: 'k1' } };
		const event = posting(given);
		const answer = formAction({ schema, secrets: ['password'], run: () => Promise.resolve('') })(event);
		const kept = {
			to: '/account?/change',
			fields: [
				['note', 'no'],
				['key', 'k1']
			]
		};
		await expect(answer).rejects.toMatchObject({ status: 401, body: { code: 'not-signed-in' } });
		expect(event.locals.kept).toEqual(kept);
	});

	it('sends nothing back to a page whose script keeps it', async () => {
		const event = posting({ actor: null });
		event.request.headers.set('x-sveltekit-action', 'true');
		const answer = formAction({ schema, run: () => Promise.resolve('') })(event);
		await expect(answer).rejects.toMatchObject({ body: { code: 'not-signed-in' } });
		expect(event.locals.kept).toBeUndefined();
	});

	it('lets a redirect and a bug pass', async () => {
		const led = answerOf(() => Promise.reject(catchRedirect()));
		await expect(led).rejects.toSatisfy(isRedirect);
		await expect(answerOf(() => Promise.reject(new Error('a bug')))).rejects.toThrow('a bug');
	});
});

function catchRedirect(): unknown {
	try {
		redirect(303, '/');
	} catch (thrown) {
		return thrown;
	}
}

describe('the key of a form', () => {
	const keyOf = async (given: Posting) => {
		let seen: PersonContext['key'] | undefined;
		const { status } = await answerOf((context) => {
			seen = context.key;
			return Promise.resolve('');
		}, given);
		return { status, key: seen };
	};

	it.each([
		['', '/account'],
		['?/change', '/account?/change'],
		['?next=%2Fward&/change', '/account?/change'],
		['?tab=tokens', '/account']
	])('belongs to the page and its action: %s', async (search, path) => {
		const { key } = await keyOf({ search, fields: { key: 'k1' } });
		expect(key).toMatchObject({ key: 'k1', path });
	});

	it('covers the fields but not the secrets', async () => {
		const of = async (fields: Record<string, string>) =>
			(await keyOf({ fields: { key: 'k1', ...fields } })).key?.digest;
		const first = await of({});
		expect(await of({ password: 'another' })).toBe(first);
		expect(await of({ note: 'another' })).not.toBe(first);
	});

	it('may be missing, and is refused when it is none', async () => {
		expect((await keyOf({})).key).toBeNull();
		expect((await keyOf({ fields: { key: 'k'.repeat(200) } })).status).toBe(200);
		expect((await keyOf({ fields: { key: 'k'.repeat(201) } })).status).toBe(400);
		expect((await keyOf({ fields: { key: 'two words' } })).status).toBe(400);
	});
});

it('lets anybody use an open form', async () => {
	const action = openFormAction({
		schema,
		run: ({ actor }) => Promise.resolve(actor ? 'somebody' : 'nobody')
	});
	expect(await action(posting({ actor: null }))).toMatchObject({ form: { message: 'nobody' } });
});
