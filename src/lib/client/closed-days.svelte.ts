import type { QueryClient } from '@tanstack/svelte-query';
import type { ClosedDay } from '$lib/domain/visits/views';
import { m } from '$lib/i18n/paraglide/messages';
import { Deeds, problemWords, type ProblemWords } from './deeds.svelte';

const PATH = '/api/closed-days';

/** The list of closed days as its page changes it, and what became of the last change. */
export class ClosedDays {
	problem = $state<ProblemWords | null>(null);
	done = $state('');

	/** The last refusal, where it is about the fields of the day that is to be closed. */
	get refused(): ProblemWords | null {
		return this.problem?.fields ? this.problem : null;
	}

	#deeds = new Deeds();

	constructor(private readonly client: QueryClient) {}

	isClosing(): boolean {
		return this.#deeds.isPending(PATH);
	}

	isOpening(id: string): boolean {
		return this.#deeds.isPending(`${PATH}/${id}/open`);
	}

	/** Answers whether it was done. */
	close(date: string, name: string): Promise<boolean> {
		return this.#attempt(async () => {
			const { visits } = await this.#deeds.post<ClosedDay>(PATH, { date, name });
			return visits > 0 ? m.visits_closed_done_standing({ count: visits }) : m.visits_closed_done();
		});
	}

	open(id: string): Promise<boolean> {
		return this.#attempt(async () => {
			await this.#deeds.post(`${PATH}/${id}/open`, {});
			return m.visits_closed_opened();
		});
	}

	async #attempt(work: () => Promise<string>): Promise<boolean> {
		[this.problem, this.done] = [null, ''];
		try {
			this.done = await work();
			return true;
		} catch (error) {
			this.problem = problemWords(error);
			return false;
		} finally {
			void this.client.invalidateQueries({ queryKey: ['visits'] });
		}
	}
}
