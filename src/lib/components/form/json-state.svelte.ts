import { earlyCheck, type SchemaSource } from './early-check';

/** What is wrong, in sentences, by the field of the body that it is about. */
export type FieldErrors = Readonly<Record<string, readonly string[]>>;

/** Why what was sent was not done; `fields` by pointer without the leading slash, such as `series/count`. */
export interface Refusal {
	title: string;
	text: string;
	signIn: boolean;
	fields?: Record<string, string>;
}

/** One form whose fields are sent as JSON: checked first by the schema of the server, and sent once at a time. */
export class JsonState {
	#check: ReturnType<typeof earlyCheck>;
	#wrong = $state.raw<FieldErrors>({});
	/** The last press went out; what stands in its way since then is the server's word. */
	#sent = $state(false);
	#busy = false;

	constructor(schema: SchemaSource) {
		this.#check = earlyCheck(schema);
	}

	/** Somebody has stepped into the form: what checks it may be fetched. */
	entered(): void {
		void this.#check.load();
	}

	/** Send what is right; what is not is named instead. A press while the one before is on its way does nothing. */
	async press(body: Record<string, unknown>, send: () => unknown): Promise<void> {
		if (this.#busy) {
			return;
		}
		this.#busy = true;
		this.#sent = false;
		try {
			this.#wrong = byField((await this.#check.issues(body)).map(({ path, message }) => [path[0], message]));
			if (Object.keys(this.#wrong).length === 0) {
				this.#sent = true;
				await send();
			}
		} finally {
			this.#busy = false;
		}
	}

	/** What is to be said beside the fields, of the check or of the server. */
	errors(refusal: Refusal | null): FieldErrors {
		return this.#sent ? byField(pointed(refusal)) : this.#wrong;
	}

	/** What is to be said of the whole: a refusal that does not stand beside one of these fields already. */
	whole(refusal: Refusal | null, fields: readonly string[]): Refusal | null {
		const named = pointed(refusal);
		const beside = named.length > 0 && named.every(([field]) => fields.includes(field));
		return this.#sent && !beside ? refusal : null;
	}
}

function pointed(refusal: Refusal | null): [string, string][] {
	return Object.entries(refusal?.fields ?? {}).map(([pointer, message]) => [
		pointer.split('/')[0] ?? '',
		message
	]);
}

function byField(said: [PropertyKey | undefined, string][]): FieldErrors {
	const fields: Record<string, string[]> = {};
	for (const [field, message] of said) {
		(fields[String(field ?? '')] ??= []).push(message);
	}
	return fields;
}
