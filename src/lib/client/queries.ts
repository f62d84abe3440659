import { browser } from '$app/environment';
import type { SessionLine } from '$lib/domain/bedside/views';
import type { ClearanceView } from '$lib/domain/clearances/views';
import type { EpisodeListItem, Nameboard } from '$lib/domain/episodes/views';
import { MINUTE } from '$lib/domain/core/time';
import type { Alarm, EscalationView } from '$lib/domain/escalations/views';
import type { LevelView } from '$lib/domain/levels/views';
import type { PatientLimitLine, RangeLine } from '$lib/domain/limits/views';
import type { LooseEnds } from '$lib/domain/loose-ends/loose-ends';
import type { Trouble } from '$lib/domain/messages/views';
import type { ThreadView } from '$lib/domain/referrals/views';
import type { PageSharing } from '$lib/domain/patient-page/views';
import type { ClosedDay, VisitItem } from '$lib/domain/visits/views';
import { getJson } from './api';

/**
 * One place for what pages ask: the key that a live event makes stale, where to fetch it again, and what the
 * server rendered the page with. Use as `createQuery(() => queries.thread(id, data.thread))`.
 */
function query<T>(queryKey: readonly string[], path: string, initialData: T) {
	return {
		queryKey,
		queryFn: () => getJson<T>(path),
		initialData,
		enabled: browser,
		staleTime: Infinity,
		// An event between a page's load and its mount finds no query to make stale, so ask once more on mount.
		refetchOnMount: 'always' as const
	};
}

const TROUBLE_REFETCH_MS = 30_000;

type List<T> = { items: T[]; next: string | null };

export const queries = {
	looseEnds: (initial: LooseEnds) => ({
		...query(['loose-ends'], '/api/loose-ends', initial),
		// A visit comes near and a re-check falls due by time alone, of which no event tells.
		refetchInterval: MINUTE
	}),
	alarms: (initial: { items: Alarm[] }) => query(['alarms'], '/api/alarms', initial),
	episodes: (unitId: string | null, initial: List<EpisodeListItem>) =>
		query(
			['episodes', unitId ?? ''],
			`/api/episodes?limit=200${unitId ? `&unit=${encodeURIComponent(unitId)}` : ''}`,
			initial
		),
	episode: (id: string, initial: Nameboard) => query(['episode', id], `/api/episodes/${id}`, initial),
	thread: (id: string, initial: ThreadView) => ({
		...query(['thread', id], `/api/threads/${id}`, initial),
		queryFn: () => wholeThread(id)
	}),
	level: (episodeId: string, initial: LevelView) =>
		query(['episode', episodeId, 'level'], `/api/episodes/${episodeId}/level`, initial),
	/** Below the episode's key, because whatever changes the episode's limits is an event of the episode. */
	patientLimits: (episodeId: string, initial: List<PatientLimitLine>) =>
		query(['episode', episodeId, 'limits'], `/api/episodes/${episodeId}/limits`, initial),
	ranges: (episodeId: string, initial: List<RangeLine>) =>
		query(['episode', episodeId, 'ranges'], `/api/episodes/${episodeId}/prescribed-ranges`, initial),
	clearance: (id: string, initial: ClearanceView) =>
		query(['clearance', id], `/api/clearances/${id}`, initial),
	sessions: (episodeId: string, initial: List<SessionLine>) =>
		query(['sessions', episodeId], `/api/episodes/${episodeId}/sessions`, initial),
	/** The visits of a week that begins on `from`, a Monday as `YYYY-MM-DD`. */
	visits: (from: string, initial: List<VisitItem>) =>
		query(['visits', from], `/api/visits?limit=200&from=${from}`, initial),
	patientVisits: (episodeId: string, initial: List<VisitItem>) =>
		query(['visits', 'of', episodeId], `/api/episodes/${episodeId}/visits`, initial),
	/** Below the visits' key, because whatever becomes of the link is an event of visits or messages. */
	patientPage: (episodeId: string, initial: PageSharing) =>
		query(['visits', 'page', episodeId], `/api/episodes/${episodeId}/patient-page`, initial),
	closedDays: (initial: List<ClosedDay>) => query(['visits', 'closed'], '/api/closed-days', initial),
	/** While something does not work, its figures are asked for again: they grow without an event. */
	delivery: (initial: List<Trouble>) => ({
		...query(['delivery'], '/api/delivery', initial),
		refetchInterval: (asked: { state: { data?: List<Trouble> } }) =>
			asked.state.data?.items.length ? TROUBLE_REFETCH_MS : false
	}),
	escalation: (id: string, initial: EscalationView) =>
		query(['escalation', id], `/api/escalations/${id}`, initial)
};

/** A thread with all its entries: a conversation is read to its end, however many pages that takes. */
async function wholeThread(id: string): Promise<ThreadView> {
	const path = `/api/threads/${id}?limit=200`;
	let view = await getJson<ThreadView>(path);
	while (view.next !== null) {
		const more = await getJson<ThreadView>(`${path}&after=${view.next}`);
		view = { ...more, items: [...view.items, ...more.items] };
	}
	return view;
}
