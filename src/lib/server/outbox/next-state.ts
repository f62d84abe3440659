import type { Outcome } from '$lib/domain/messages/outcome';
import { nextAttempt, type RetryKind } from '$lib/domain/messages/retry';
import type { MessageState, OutboxRow } from './change';

/** What a message becomes after an attempt; `nextAt` where it is tried again. */
export interface NextState {
	state: Extract<MessageState, 'accepted' | 'ready' | 'failed'>;
	reason: string | null;
	nextAt?: number;
	providerId?: string;
}

/** What is known of the attempts so far, the latest included. */
export interface History {
	attempts: number;
	firstAt: number;
	now: number;
	/** From 0, included, to 1, excluded. */
	random: number;
}

const RETRY: Record<OutboxRow['kind'], RetryKind> = {
	escalation: 'urgent',
	notice: 'urgent',
	reminder: 'reminder',
	answer: 'reminder',
	mail: 'mail',
	visit: 'reminder',
	page: 'reminder',
	trial: 'urgent'
};

/** Accepted, tried again on the schedule of its kind, or failed with the reason. */
export function nextState(
	row: Pick<OutboxRow, 'kind' | 'expiresAt'>,
	outcome: Outcome,
	history: History
): NextState {
	switch (outcome.kind) {
		case 'accepted':
			return { state: 'accepted', reason: null, providerId: outcome.id };
		case 'permanent':
			return { state: 'failed', reason: outcome.reason };
		case 'transient':
			return again(row, outcome.reason, outcome.retryAfter, history);
		case 'unknown':
			return again(row, outcome.reason, null, history);
	}
}

function again(
	row: Pick<OutboxRow, 'kind' | 'expiresAt'>,
	reason: string,
	retryAfter: number | null,
	history: History
): NextState {
	const { kind, expiresAt } = row;
	const next = nextAttempt({ ...history, kind: RETRY[kind], expiresAt, retryAfter });
	return next === 'exhausted' ? { state: 'failed', reason } : { state: 'ready', reason, nextAt: next };
}
