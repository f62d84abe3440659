import { superValidate } from 'sveltekit-superforms';
import { zod4, type ZodValidationSchema } from 'sveltekit-superforms/adapters';
import { config } from 'zod';

// The pages forbid code made of text, which the schema library would try, and report.
config({ jitless: true });

/** What is wrong with one field, or with the form as a whole where the path is empty. */
export interface Issue {
	path: string[];
	message: string;
}

/**
 * What the server would say of a form that is posted: read from the controls and checked by the same two steps as
 * there, so that an optional field left empty is none, and every sentence is the same.
 */
export async function issuesOf(posted: FormData, schema: ZodValidationSchema): Promise<Issue[]> {
	const { errors } = await superValidate(posted, zod4(schema));
	return Object.entries(errors as Record<string, unknown>).flatMap(([field, told]) =>
		messagesOf(told).map((message) => ({ path: field === '_errors' ? [] : [field], message }))
	);
}

/** Of a list of fields, what is said of the list as a whole. */
function messagesOf(told: unknown): string[] {
	return Array.isArray(told) ? told.map(String) : ((told as { _errors?: string[] })._errors ?? []);
}
