import { SvelteSet } from 'svelte/reactivity';
import { when, type Reader } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';
import { ApiProblem, newKey, postJson } from './api';

/**
 * The writes of one page. A write that got no clear answer keeps its key, so that pressing again does it once; a
 * write under way is not sent a second time.
 */
export class Deeds {
	#pending = new SvelteSet<string>();
	#keys: Record<string, string> = {};

	/** Whether the write to this address is on its way. */
	isPending(path: string): boolean {
		return this.#pending.has(path);
	}

	/**
	 * Post to the JSON API.
	 * @throws ApiProblem
	 */
	async post<T>(path: string, body: unknown = {}): Promise<T> {
		const write = `${path} ${JSON.stringify(body)}`;
		const key = this.#keys[write] ?? newKey();
		this.#keys[write] = key;
		this.#pending.add(path);
		try {
			const answer = await postJson<T>(path, body, key);
			delete this.#keys[write];
			return answer;
		} catch (error) {
			if (wasRefused(error)) {
				delete this.#keys[write];
			}
			throw error;
		} finally {
			this.#pending.delete(path);
		}
	}
}

/** The server decided against it, and would again: another try is another write. */
function wasRefused(error: unknown): boolean {
	return (
		error instanceof ApiProblem && error.status >= 400 && error.status < 500 && error.code !== 'in-flight'
	);
}

/** A problem in plain words; `signIn` when signing in again is what helps. */
export interface ProblemWords {
	title: string;
	text: string;
	signIn: boolean;
	/** What is wrong with single fields, by pointer without the leading slash; left out where nothing is. */
	fields?: Record<string, string>;
}

/**
 * What happened, whether what was typed is safe, and what to do now. Rethrows what is no problem of the API.
 * @param reader for whom times are put into words; without one they stand as the server gave them
 */
export function problemWords(error: unknown, reader?: Reader): ProblemWords {
	if (!(error instanceof ApiProblem)) {
		throw error;
	}
	if (error.status === 401) {
		return { title: m.common_signed_out_title(), text: m.common_signed_out_link(), signIn: true };
	}
	if (error.code === 'offline') {
		return { title: m.common_offline_title(), text: m.common_offline_text(), signIn: false };
	}
	if (error.status === 0 || error.status >= 500) {
		return { title: m.common_unreached_title(), text: m.common_unreached_text(), signIn: false };
	}
	const text = (reader && takenWords(error, reader)) ?? error.detail;
	const fields = Object.keys(error.fields).length > 0 ? { fields: error.fields } : {};
	return { title: m.common_notice_error(), text, signIn: false, ...fields };
}

/** Who was faster, and when. */
function takenWords({ code, body }: ApiProblem, reader: Reader): string | null {
	const { takenBy, takenAt } = body as { takenBy?: { name?: string } | null; takenAt?: string };
	if (code !== 'already-taken' || !takenBy?.name || !takenAt) {
		return null;
	}
	return m.home_already_taken({ name: takenBy.name, time: when(Date.parse(takenAt), reader) });
}
