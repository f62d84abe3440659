/**
 * A form that came without script after its sign-in had ended. The page that answers it keeps the fields and sends
 * them on once somebody has signed in there.
 */
export interface KeptForm {
	/** Where the form was going: path and action of a page of ours. */
	to: string;
	/** Names and values, in the order in which they came; secrets and files are left out. */
	fields: [name: string, value: string][];
}

/** The fields of the sign-in that stands around a kept form, named so that no form has the same. */
export const SIGN_IN_FIELDS = { to: 'signInTo', email: 'signInEmail', password: 'signInPassword' } as const;

/**
 * What is kept of a posted form.
 * @param leftOut names of fields that must not come back
 */
export function keptForm(to: string, posted: FormData, leftOut: readonly string[]): KeptForm {
	const fields = [...posted].flatMap(([name, value]): KeptForm['fields'] =>
		typeof value === 'string' && !leftOut.includes(name) ? [[name, value]] : []
	);
	return { to, fields };
}

/** What a person typed in words, to be shown; codes and identifiers are only passed on. */
export function wordsOf({ fields }: KeptForm): string[] {
	return fields.map(([, value]) => value.trim()).filter((value) => /\s/.test(value));
}
