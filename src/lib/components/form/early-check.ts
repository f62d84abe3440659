import type { issuesOf } from './check';
import type { ClientValidationAdapter } from 'sveltekit-superforms/adapters';
import type { ZodObject } from 'zod';

/** Fetches the schema of an area when it is wanted: `() => import('…').then(({ referForm }) => referForm)`. */
export type SchemaSource = () => Promise<ZodObject>;

type Loaded = [{ issuesOf: typeof issuesOf }, ZodObject];

/**
 * The check of a form in the browser, before anything is sent. Schema and checker are fetched with the first step
 * into the form, so that a page weighs nothing more until somebody fills it in. Where they cannot be fetched the
 * server alone decides, as it does without script.
 */
export function earlyCheck<T extends Record<string, unknown>>(source: SchemaSource) {
	let loading: Promise<Loaded | null> | null = null;

	/** Fetch what is needed; what failed is tried again the next time. */
	function load(): Promise<Loaded | null> {
		loading ??= Promise.all([import('./check'), source()]).catch(() => {
			loading = null;
			return null;
		});
		return loading;
	}

	const validators: ClientValidationAdapter<T> = {
		superFormValidationLibrary: 'zod4',
		// What was typed stays as it was typed: a day in words is not turned into its code on the way.
		async validate(data) {
			const loaded = await load();
			const issues = loaded ? await loaded[0].issuesOf(data as T, loaded[1]) : [];
			return issues.length > 0 ? { success: false, issues } : { success: true, data: data as T };
		}
	};

	/**
	 * superforms leaves out its check of a form that carries `novalidate`, as ours do to keep the browser's own
	 * bubbles away. So the mark is lifted while it looks, in the same turn, and stands again after it.
	 */
	function begin({ formElement }: { formElement: HTMLFormElement }): void {
		formElement.noValidate = false;
		setTimeout(() => (formElement.noValidate = true));
	}

	return { validators, begin, load };
}
