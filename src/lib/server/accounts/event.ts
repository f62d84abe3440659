import type { LiveEvent } from '$lib/domain/live/events';

/**
 * That something about an account changed, for its owner alone. Their open streams then look whether they are
 * still entitled and end when they are not.
 */
export function accountEvent(kind: string, userId: string): LiveEvent {
	return { topic: 'account', kind, id: userId, episodeId: null, userId };
}
