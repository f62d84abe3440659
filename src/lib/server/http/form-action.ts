import { error, fail, type ActionFailure, type RequestEvent } from '@sveltejs/kit';
import { message, setError, superValidate, type Infer, type SuperValidated } from 'sveltekit-superforms';
import { zod4, type ZodValidationSchema } from 'sveltekit-superforms/adapters';
import { keptForm } from '$lib/domain/accounts/kept';
import { Problem, PROBLEMS, type ProblemCode } from '$lib/domain/core/errors';
import { m } from '$lib/i18n/paraglide/messages';
import { requirePerson, type Context, type PersonContext } from '../context';
import { withFormKey } from './page';

type Fields<S extends ZodValidationSchema> = Infer<S, 'zod4'>;
type Posted<S extends ZodValidationSchema> = SuperValidated<Fields<S>, string>;
type Answer<S extends ZodValidationSchema> =
	| { form: Posted<S> }
	/** `code` for a script, which offers a way on by it. */
	| ActionFailure<{ form: Posted<S>; code?: ProblemCode }>;

interface Acting<S extends ZodValidationSchema, C extends Context> {
	/** Checks the posted fields; the same one as in `load`. */
	schema: S;
	/** The form's own name, where a page has several; the same one as in `load`. */
	id?: string;
	/** Fields that are never sent back and never digested, such as passwords. */
	secrets?: readonly (keyof Fields<S> & string)[];
	/** Other words for a problem than its own, by code. */
	words?: Partial<Record<ProblemCode, (problem: Problem) => string>>;
	/**
	 * Does it, under the form's hidden key when there is one.
	 * @returns what to tell beside the button; throw Kit's `redirect` to lead elsewhere
	 */
	run(context: C, fields: Fields<S>, event: RequestEvent): Promise<string>;
}

/**
 * An action for the person who is signed in. Without one the form says so and keeps what was typed: in the page where
 * there is script, else in the page that answers, which asks for the sign-in and sends the form on.
 */
export function formAction<S extends ZodValidationSchema>(spec: Acting<S, PersonContext>) {
	return (event: RequestEvent) => acting(spec, event, requirePerson);
}

/** An action that needs no sign-in: signing in itself, an invitation, a patient's answer. */
export function openFormAction<S extends ZodValidationSchema>(spec: Acting<S, Context>) {
	return (event: RequestEvent) => acting(spec, event, (context) => context);
}

async function acting<S extends ZodValidationSchema, C extends Context>(
	spec: Acting<S, C>,
	event: RequestEvent,
	narrow: (context: Context) => C
): Promise<Answer<S>> {
	const posted = await postedFields(event);
	const context = orSignIn(() => narrow(event.locals.context), event, posted, spec.secrets ?? []);
	const form: Posted<S> = await superValidate(posted, zod4(spec.schema), spec.id ? { id: spec.id } : {});
	const fields = form.data;
	form.data = without(fields, spec.secrets ?? []);
	if (!form.valid) {
		return fail(PROBLEMS.invalid.status, { form });
	}
	try {
		const key = posted.get('key');
		const keyed = typeof key === 'string' && key ? withFormKey(context, event, key, form.data) : context;
		return message(form, await spec.run(keyed, fields, event));
	} catch (thrown) {
		if (!(thrown instanceof Problem)) {
			throw thrown;
		}
		return refuse(spec, form, thrown, event);
	}
}

async function postedFields({ request }: RequestEvent): Promise<FormData> {
	try {
		return await request.formData();
	} catch {
		error(PROBLEMS.malformed.status, { message: PROBLEMS.malformed.title, code: 'malformed' });
	}
}

/** The context, or the answer 401 with the form in it, where no script keeps it. */
function orSignIn<C>(
	narrowed: () => C,
	event: RequestEvent,
	posted: FormData,
	secrets: readonly string[]
): C {
	try {
		return narrowed();
	} catch (thrown) {
		if (!(thrown instanceof Problem)) {
			throw thrown;
		}
		const { request, url } = event;
		const scripted = request.headers.get('x-sveltekit-action') === 'true';
		if (!scripted) {
			// The hooks answer with a sign-in that sends it on.
			event.locals.kept = keptForm(url.pathname + url.search, posted, secrets);
		}
		error(thrown.status, { message: thrown.detail, code: thrown.code });
	}
}

/** Blank the secret fields, so that they neither travel back nor stand in the page. */
function without<T extends Record<string, unknown>>(fields: T, secrets: readonly string[]): T {
	return { ...fields, ...Object.fromEntries(secrets.map((name) => [name, ''])) };
}

/** Say why beside the fields it is about, and what belongs to no field beside the button. */
function refuse<S extends ZodValidationSchema, C extends Context>(
	spec: Acting<S, C>,
	form: Posted<S>,
	problem: Problem,
	event: RequestEvent
): Answer<S> {
	const { status } = PROBLEMS[problem.code];
	const { retryAfterSeconds, errors = [] } = problem.extra;
	if (retryAfterSeconds !== undefined) {
		event.setHeaders({ 'retry-after': String(retryAfterSeconds) });
	}
	const names = Object.keys(form.data as object);
	const beside = errors.filter(({ pointer }) => names.includes(fieldOf(pointer)));
	for (const { pointer, message: text } of beside) {
		setError(form as SuperValidated<Record<string, unknown>, string>, fieldOf(pointer), text);
	}
	if (beside.length > 0) {
		return fail(status, { form });
	}
	message(form, wordsOf(spec, problem), { status });
	return fail(status, { form, code: problem.code });
}

function wordsOf<S extends ZodValidationSchema, C extends Context>(
	{ words }: Acting<S, C>,
	problem: Problem
): string {
	// Without script the page comes back with a new key, so the next press is another write.
	const usual = problem.code === 'idempotency-mismatch' ? m.common_arrived_plain() : problem.detail;
	return words?.[problem.code]?.(problem) ?? usual;
}

/** `/units/0` is about the field `units`. */
function fieldOf(pointer: string): string {
	return pointer.split('/')[1] ?? '';
}
