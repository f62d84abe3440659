import { page } from '$app/state';

/** What a page knows of the form that it came back with; each action answers with some of it. */
type Answered = {
	form?: { id?: string; valid?: boolean; message?: string; data?: Record<string, unknown> };
};

/**
 * Whether the page is the answer to this action, sent by a browser without script: then what it says must stand in
 * view, also of a form behind a fold. With script the page stays, and the address never names an action.
 * @param action as the form has it, such as `?/close`
 */
export function cameBack(action: string): boolean {
	return page.form !== null && page.url.search === action;
}

/** The form of that name, where the page came back with it because the server refused it; else null. */
export function refusedForm(id: string | undefined): NonNullable<Answered['form']> | null {
	const { form } = (page.form ?? {}) as Answered;
	return form && form.id === id && form.valid === false ? form : null;
}

/** Why the server refused this action with these fields, where the page came back to say so. */
export function refusalOf(action: string, fields: Record<string, unknown>): string | null {
	const { form } = (page.form ?? {}) as Answered;
	const same = Object.entries(fields).every(([name, value]) => form?.data?.[name] === value);
	return cameBack(action) && form?.valid === false && same ? (form.message ?? null) : null;
}
