import { fromStore } from 'svelte/store';
import { superForm, type FormOptions, type SuperForm, type SuperValidated } from 'sveltekit-superforms';
import { routes } from '$lib/routes';
import { refusedForm } from './came-back';
import { earlyCheck, type SchemaSource } from './early-check';
import { outcomeOf, type Outcome } from './outcome';

/** What a form's fields read and write, in runes. */
export type FormState<T extends Record<string, unknown>> = {
	/** What is typed; assign to a property, or bind to it. */
	readonly values: T;
	/** What is wrong, per field. */
	readonly errors: Partial<Record<keyof T, readonly string[]>>;
	/** What is wrong, or was done, with the form as a whole. */
	readonly message: string | null;
	readonly valid: boolean;
	/** It is on its way. */
	readonly pending: boolean;
	/** It has been on its way for longer than one notices. */
	readonly slow: boolean;
	/** It got no answer of its own; what was typed is still there. */
	readonly outcome: Outcome | null;
	readonly enhance: SuperForm<T, string>['enhance'];
	/** Somebody has stepped into the form: what checks it may be fetched. */
	entered(): void;
};

type Source<T extends Record<string, unknown>> = SuperValidated<T, string> | SuperForm<T, string>;

/**
 * A form over superforms' stores. Call it while a component is set up.
 *
 * @param source what the server's `superValidate` gave, or a form that a page made itself
 * @param options superforms' own; they win over the ones here
 * @param onsaved hears when the server has taken what was sent
 * @param schema the one that the server checks with; with it, what is wrong is said before anything is sent
 */
export function formState<T extends Record<string, unknown>>(
	source: Source<T>,
	options: FormOptions<T, string> = {},
	onsaved: () => void = () => {},
	schema?: SchemaSource
): FormState<T> {
	const check = schema && earlyCheck<T>(schema);
	let outcome = $state<Outcome | null>(null);
	// A page that comes back without script already says how the form ended.
	let valid = $state('enhance' in source || refusedForm(source.id) === null);
	// Checked when it is sent and not at every step: an error that appeared on leaving a field would push the button
	// away from under the finger.
	const checked = check && ({ validators: check.validators, validationMethod: 'submit-only' } as const);
	const form =
		'enhance' in source
			? source
			: superForm(source, { clearOnSubmit: 'errors-and-message', ...checked, ...options });
	const typed = fromStore(form.form);
	const errors = fromStore(form.errors);
	const message = fromStore(form.message);
	const pending = fromStore(form.submitting);
	const slow = fromStore(form.delayed);

	const enhance: FormState<T>['enhance'] = (element, events) =>
		form.enhance(element, {
			...events,
			onSubmit: (input) => {
				outcome = null;
				check?.begin(input);
				return events?.onSubmit?.(input);
			},
			onResult: (event) => {
				const { result } = event;
				outcome = outcomeOf(result, routes.signIn(), !navigator.onLine);
				if (outcome) {
					event.cancel();
					return;
				}
				return events?.onResult?.(event);
			},
			onUpdated: (event) => {
				valid = event.form.valid;
				if (valid) {
					onsaved();
				}
				return events?.onUpdated?.(event);
			}
		});

	return {
		values: writableView(form, () => typed.current),
		get errors() {
			return errors.current as Partial<Record<keyof T, readonly string[]>>;
		},
		get message() {
			return formMessage(message.current, errors.current);
		},
		get valid() {
			return valid;
		},
		get pending() {
			return pending.current;
		},
		get slow() {
			return slow.current;
		},
		get outcome() {
			return outcome;
		},
		enhance,
		entered: () => void check?.load()
	};
}

/** The store's value as an object whose properties can be bound to; every assignment goes through the store. */
function writableView<T extends Record<string, unknown>>(form: SuperForm<T, string>, read: () => T): T {
	return new Proxy({} as T, {
		get: (_, name) => read()[name as keyof T],
		has: (_, name) => name in read(),
		set: (_, name, value: T[keyof T]) => {
			form.form.update((values) => ({ ...values, [name]: value }));
			return true;
		}
	});
}

function formMessage(message: string | undefined, errors: { _errors?: string[] }): string | null {
	const whole = errors._errors?.join(' ');
	return message ?? whole ?? null;
}
