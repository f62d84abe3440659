import type { QueryClient } from '@tanstack/svelte-query';
import type { VisitLine } from '$lib/domain/episodes/views';
import type { PageWay } from '$lib/domain/patient-page/forms';
import type { VisitMove } from '$lib/domain/visits/states';
import type { VisitItem } from '$lib/domain/visits/views';
import { m } from '$lib/i18n/paraglide/messages';
import { Deeds, problemWords, type ProblemWords } from './deeds.svelte';

/** What is done about visits from a page: moved on, booked, followed up; and what became of it. */
export class VisitDesk {
	/** Why the last thing was not done; null when it was. */
	problem = $state<ProblemWords | null>(null);
	/** What was done last, in words. */
	done = $state('');

	#deeds = new Deeds();

	constructor(private readonly client: QueryClient) {}

	isMoving(visit: Pick<VisitItem, 'id'>, move: VisitMove | 'follow-up' | 'move'): boolean {
		return this.#deeds.isPending(pathOf(visit, move));
	}

	isBooking(episodeId: string): boolean {
		return this.#deeds.isPending(bookingPath(episodeId));
	}

	/** Answers whether it was done. */
	move(visit: VisitItem, move: VisitMove, reason?: string): Promise<boolean> {
		const body = reason === undefined ? {} : { reason };
		return this.#attempt(async () => {
			const { told } = await this.#deeds.post<{ told?: string[] }>(pathOf(visit, move), body);
			return cancelledWords(told);
		});
	}

	/** Another time, length or place; whether the patient hears of it is said, because else somebody has to call. */
	reschedule(visit: VisitItem, body: Record<string, unknown>): Promise<boolean> {
		return this.#attempt(async () => {
			const { told } = await this.#deeds.post<{ told: string[] }>(pathOf(visit, 'move'), body);
			return told.length > 0 ? m.visits_done_moved() : m.visits_done_moved_untold();
		});
	}

	/** Send the patient the link to their page. */
	sendPage(episodeId: string, way: PageWay): Promise<boolean> {
		return this.#attempt(async () => {
			await this.#deeds.post(pagePath(episodeId), { way });
			return m.visits_page_done_sent();
		});
	}

	endPage(linkId: string): Promise<boolean> {
		return this.#attempt(async () => {
			await this.#deeds.post(endPath(linkId), {});
			return m.visits_page_done_ended();
		});
	}

	isSending(episodeId: string): boolean {
		return this.#deeds.isPending(pagePath(episodeId));
	}

	isEnding(linkId: string): boolean {
		return this.#deeds.isPending(endPath(linkId));
	}

	/** Nothing more is to be done about a visit that the patient cancelled. */
	followUp(visit: VisitItem): Promise<boolean> {
		return this.#attempt(async () => {
			await this.#deeds.post(pathOf(visit, 'follow-up'));
			return m.visits_done_followed_up();
		});
	}

	book(episodeId: string, body: Record<string, unknown>): Promise<boolean> {
		return this.#attempt(async () => {
			const { items } = await this.#deeds.post<{ items: VisitLine[] }>(bookingPath(episodeId), body);
			return m.visits_done_booked({ count: items.length });
		});
	}

	/** Forget what became of the last thing. */
	clear(): void {
		this.problem = null;
		this.done = '';
	}

	/** Whatever came of it, the page is fetched anew: of two who move a visit at once one was faster. */
	async #attempt(work: () => Promise<string>): Promise<boolean> {
		this.clear();
		try {
			this.done = await work();
			return true;
		} catch (error) {
			this.problem = problemWords(error);
			return false;
		} finally {
			for (const queryKey of [['visits'], ['episode'], ['loose-ends']]) {
				void this.client.invalidateQueries({ queryKey });
			}
		}
	}
}

/** What is said of a cancellation: whether the patient hears of it, because else somebody has to call. */
function cancelledWords(told: string[] | undefined): string {
	if (told === undefined) {
		return '';
	}
	return told.length > 0 ? m.visits_done_cancelled() : m.visits_done_cancelled_untold();
}

function pagePath(episodeId: string): string {
	return `/api/episodes/${episodeId}/patient-page`;
}

function endPath(linkId: string): string {
	return `/api/patient-pages/${linkId}/end`;
}

function pathOf({ id }: Pick<VisitItem, 'id'>, move: VisitMove | 'follow-up' | 'move'): string {
	return `/api/visits/${id}/${move}`;
}

function bookingPath(episodeId: string): string {
	return `/api/episodes/${episodeId}/visits`;
}
