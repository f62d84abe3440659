/** What a live event can be about. Events are hints with identifiers: the client fetches what it may read. */
export const TOPICS = [
	'episode',
	'referral',
	'thread',
	'clearance',
	'session',
	'escalation',
	'alarm',
	'visit',
	'message',
	'delivery',
	'account'
] as const;
export type Topic = (typeof TOPICS)[number];

export interface LiveEvent {
	topic: Topic;
	/** What happened, such as 'accepted'. */
	kind: string;
	id: string;
	episodeId: string | null;
	/** The unit whose people hear it; where the episode is, when left out. A move names the old unit and the new. */
	unitId?: string | null;
	/** Set for what concerns one person alone; others do not hear it. */
	userId?: string | null;
}

/** An event as it stands in the stream: `id` is its place in the log. */
export type StreamEvent = Pick<LiveEvent, 'topic' | 'kind' | 'id' | 'episodeId'>;

/** The first words of the query keys that pages use; an event names those that it makes stale. */
export type QueryKey = readonly [string, ...string[]];

/**
 * Which cached answers an event makes stale. Loose ends are derived from nearly everything, so nearly
 * everything touches them; the rest is exact.
 */
export function staleKeys(event: StreamEvent): QueryKey[] {
	const episode: QueryKey[] = event.episodeId ? [['episode', event.episodeId]] : [];
	const around: QueryKey[] = [['loose-ends'], ['episodes'], ...episode];
	switch (event.topic) {
		case 'thread':
			// A question may be put to somebody, or be answered by what they wrote.
			return [...around, ['thread', event.id]];
		case 'referral':
			return [...around, ['thread']];
		case 'clearance':
			// One clearance can change what another rests on: an arm stage moves the precautions.
			return [...around, ['clearance'], ['thread']];
		case 'session':
			return [...around, ['clearance'], ...(event.episodeId ? [['sessions', event.episodeId] as const] : [])];
		case 'escalation':
			return [...around, ['clearance'], ['escalation', event.id]];
		case 'alarm':
			return [['alarms']];
		case 'visit':
			return [...around, ['visits'], ['visit', event.id]];
		case 'episode':
			// Wound, lines, oxygen, level and move: what a decision rests on.
			return [...around, ['clearance']];
		case 'message':
			return [['loose-ends'], ['messages'], ['visits'], ['escalation']];
		case 'delivery':
			return [['delivery']];
		case 'account':
			return [['me'], ['accounts']];
	}
}
