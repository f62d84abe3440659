/**
 * When a message that did not arrive is tried again.
 *
 * Delays are shortened by a random share between none and all ('full jitter'), so that a thousand messages that
 * failed together do not come back together. Source of the pattern: AWS Well-Architected, REL05-BP03. The delays
 * themselves are common practice, no published source; RFC 5321 section 4.5.4.1 asks for retries of mail over
 * days, but here a mail that is a day late is a task for a person.
 */
import { HOUR, MINUTE, SECOND } from '../core/time';
import type { Instant } from '../core/time';

export const RETRY_KINDS = ['urgent', 'reminder', 'mail'] as const;
export type RetryKind = (typeof RETRY_KINDS)[number];

interface Schedule {
	/** The longest wait before the second attempt, the third, and so on. */
	readonly delays: readonly number[];
	/** Whether the last delay repeats until the time is up. */
	readonly repeats: boolean;
	/** How long after the first attempt nothing is tried any more; null where only the expiry counts. */
	readonly span: number | null;
}

/** The first attempt of each kind is made at once. */
export const SCHEDULES: Record<RetryKind, Schedule> = {
	urgent: { delays: [5 * SECOND, 15 * SECOND, 45 * SECOND], repeats: false, span: null },
	reminder: { delays: [1, 5, 15, 60].map((minutes) => minutes * MINUTE), repeats: true, span: null },
	mail: { delays: [1, 5, 15, 30].map((minutes) => minutes * MINUTE), repeats: true, span: 24 * HOUR }
};

/** An urgent message waits no longer than this for a gateway that asks for time: the next channel is faster. */
export const URGENT_PATIENCE = 45 * SECOND;

export interface Attempted {
	readonly kind: RetryKind;
	/** Attempts made so far, at least 1. */
	readonly attempts: number;
	readonly firstAt: Instant;
	readonly now: Instant;
	/** From here on the message is of no use; null when it never expires. */
	readonly expiresAt: Instant | null;
	/** What the gateway asked for, in milliseconds; null when it did not ask. */
	readonly retryAfter: number | null;
	/** A number from 0, included, to 1, excluded. */
	readonly random: number;
}

/** The instant of the next attempt, or `exhausted`: then the next channel or a person takes over. */
export function nextAttempt(attempted: Attempted): Instant | 'exhausted' {
	const { kind, attempts, now, expiresAt, retryAfter, random } = attempted;
	const { delays, repeats, span } = SCHEDULES[kind];
	const delay = delays[attempts - 1] ?? (repeats ? delays.at(-1) : undefined);
	if (delay === undefined || (kind === 'urgent' && (retryAfter ?? 0) > URGENT_PATIENCE)) {
		return 'exhausted';
	}
	// The gateway's own wish is a floor: no jitter may undercut it.
	const at = now + Math.max(Math.round(delay * random), retryAfter ?? 0);
	const end = span === null ? Infinity : attempted.firstAt + span;
	return at >= (expiresAt ?? Infinity) || at > end ? 'exhausted' : at;
}

/**
 * Milliseconds that a `Retry-After` header asks to wait, from seconds or an HTTP date (RFC 9110 section 10.2.3);
 * null when it is missing or unreadable, 0 when the date is past.
 */
export function readRetryAfter(header: string | null | undefined, now: Instant): number | null {
	const value = header?.trim() ?? '';
	if (/^\d{1,9}$/.test(value)) {
		return Number(value) * SECOND;
	}
	const date = /^[A-Za-z]{3,9}, .* GMT$/.test(value) ? Date.parse(value) : NaN;
	return Number.isNaN(date) ? null : Math.max(0, date - now);
}
