import type { QueryClient } from '@tanstack/svelte-query';
import type { ClosedDay } from '$lib/domain/visits/views';
import { m } from '$lib/i18n/paraglide/messages';
import { ApiProblem } from './api';
import { Deeds, problemWords, type ProblemWords } from './deeds.svelte';

const PATH = '/api/closed-days';

/** The list of closed days as its page changes it, and what became of the last change. */
export class ClosedDays {
	problem = $state<ProblemWords | null>(null);
	/** What is wrong with a field, by its name. */
	fields = $state<Record<string, string>>({});
	done = $state('');

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
		[this.problem, this.fields, this.done] = [null, {}, ''];
		try {
			this.done = await work();
			return true;
		} catch (error) {
			this.problem = problemWords(error);
			this.fields = error instanceof ApiProblem ? error.fields : {};
			return false;
		} finally {
			void this.client.invalidateQueries({ queryKey: ['visits'] });
		}
	}
}
