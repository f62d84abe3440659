import type { Issue, issuesOf } from './check';
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
	/** Fetch what is needed: once, as the browser keeps it; what failed is tried again the next time. */
	function load(): Promise<Loaded | null> {
		return Promise.all([import('./check'), source()]).catch(() => null);
	}

	/** What is wrong with what is typed; nothing, where it cannot be told here. */
	async function issues(data: Record<string, unknown>): Promise<Issue[]> {
		const loaded = await load();
		return loaded ? loaded[0].issuesOf(data, loaded[1]) : [];
	}

	const validators: ClientValidationAdapter<T> = {
		superFormValidationLibrary: 'zod4',
		// What was typed stays as it was typed: a day in words is not turned into its code on the way.
		async validate(data) {
			const wrong = await issues(data as T);
			return wrong.length > 0 ? { success: false, issues: wrong } : { success: true, data: data as T };
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

	return { validators, begin, load, issues };
}
