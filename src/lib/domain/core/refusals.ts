import { Problem, type FieldError, type ProblemCode } from './errors';

/** Which field a problem is about that names none itself. */
const FIELD_OF: Partial<Record<ProblemCode, string>> = {
	'bed-in-use': '/bed',
	'already-admitted': '/patient/mrn'
};

/**
 * Gathers what is wrong with several fields, so that a person hears of everything at once instead of one thing
 * after another.
 */
export class Refusals {
	readonly #problems: Problem[] = [];

	/** What the check answers, or null when it refuses. An error that is no {@link Problem} is a bug and goes on. */
	async of<T>(check: () => T | Promise<T>): Promise<T | null> {
		try {
			return await check();
		} catch (thrown) {
			if (!(thrown instanceof Problem)) {
				throw thrown;
			}
			this.#problems.push(thrown);
			return null;
		}
	}

	/**
	 * @throws Problem the only one as it is; of several an `invalid` one with the errors of all, and the members
	 * that they add to the answer
	 */
	throwIfAny(): void {
		const [first, ...more] = this.#problems;
		if (!first) {
			return;
		}
		if (more.length === 0) {
			throw first;
		}
		const all = this.#problems;
		throw new Problem('invalid', all.map(({ detail }) => detail).join(' '), {
			...Object.assign({}, ...all.map(({ extra }) => extra)),
			errors: all.flatMap(errorsOf)
		});
	}
}

function errorsOf({ code, detail, extra }: Problem): FieldError[] {
	return extra.errors ?? [{ pointer: FIELD_OF[code] ?? '', message: detail }];
}
