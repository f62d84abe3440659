import { config, type ZodObject } from 'zod';

// The pages forbid code made of text, which the schema library would try, and report.
config({ jitless: true });

/** What is wrong with one field. */
export interface Issue {
	path: PropertyKey[];
	message: string;
}

/** What the schema says of what is typed, in the sentences in which the server says it. */
export async function issuesOf(typed: Record<string, unknown>, schema: ZodObject): Promise<Issue[]> {
	const { error } = await schema.safeParseAsync(asPosted(typed, schema));
	return error?.issues.map(({ path, message }) => ({ path, message })) ?? [];
}

/** An optional field that is left empty is none, as it is when posted. */
function asPosted(typed: Record<string, unknown>, { shape }: ZodObject): Record<string, unknown> {
	return Object.fromEntries(
		Object.entries(typed).map(([name, value]) => {
			const optional = value === '' && shape[name]?.safeParse(undefined).success;
			return [name, optional ? undefined : value];
		})
	);
}
