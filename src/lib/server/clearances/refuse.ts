/** What stands in the way of a decision: somebody was faster, something is new, or a figure was passed over. */
import { eq } from 'drizzle-orm';
import type { ClearanceEvidence } from '$lib/domain/clearances/forms';
import { newsSince } from '$lib/domain/clearances/news';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { isRfc3339, parseRfc3339, toRfc3339 } from '$lib/domain/core/instant';
import { newsWords } from '$lib/i18n/clearance-news';
import { limitWords } from '$lib/i18n/limits';
import { m } from '$lib/i18n/paraglide/messages';
import type { EpisodeRow } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import type { clearances } from '../db/schema';
import { users } from '../db/schema';
import { shownTo } from './evidence';
import { hospitalToday } from './lapse';

type ClearanceRow = typeof clearances.$inferSelect;

/**
 * What somebody had in view when they decided. What is left out is not checked, but for the decision before when
 * what was given is given with other limits.
 */
export interface Seen {
	/**
	 * The decision before theirs: its instant in RFC 3339, null for none. When another has come between, theirs is
	 * refused and names who was faster.
	 */
	decidedAt?: string | null;
	/** The evidence, as {@link marksOf} gives it. When something new is on record, theirs is refused and says what. */
	evidence?: string;
}

/** A decision is stored with what is on record: it must not claim that somebody knew what they were not shown. */
export function refuseUnseen(
	{ actor }: PersonContext,
	{ unitId }: EpisodeRow,
	evidence: ClearanceEvidence | null,
	shown: string | undefined
): void {
	const news =
		evidence === null || shown === undefined ? null : newsSince(shown, shownTo(actor, unitId, evidence));
	if (news !== null) {
		throw new Problem('evidence-changed', m.clearances_evidence_changed({ news: newsWords(news) }), { news });
	}
}

/** Whether the decision on record is the one that they go by; an instant is the same however it is written. */
function isSeen({ decidedAt }: ClearanceRow, seen: Seen['decidedAt']): boolean {
	if (seen === undefined || seen === null) {
		return seen === undefined || decidedAt === null;
	}
	return isRfc3339(seen) && parseRfc3339(seen) === decidedAt;
}

export async function refuseSlower(
	tx: Tx,
	clearance: ClearanceRow,
	seen: Seen['decidedAt'],
	mustSay: boolean
): Promise<void> {
	if (isSeen(clearance, seen) && !(mustSay && seen === undefined)) {
		return;
	}
	const { state, decidedBy, decidedAt } = clearance;
	const [decider] = await tx
		.select({ name: users.name })
		.from(users)
		.where(eq(users.id, decidedBy ?? ''));
	throw new Problem('wrong-state', `${decider?.name ?? 'Somebody'} was faster: the clearance is ${state}.`, {
		state,
		decidedBy: decider?.name ?? null,
		decidedAt: decidedAt === null ? null : toRfc3339(decidedAt)
	});
}

/** A figure that was proposed is not passed over by leaving it out. */
export function refusePassedOver({ state, proposed }: ClearanceRow, limitsSaid: boolean | undefined): void {
	if (state === 'asked' && proposed !== null && limitsSaid === false) {
		const limits = limitWords(proposed).join(', ');
		throw invalidField('/limits', `limits is left out and ${limits} was proposed; say it, or null for none.`);
	}
}

export function refusePastReview(reviewOn: string | null | undefined, now: number): void {
	if (reviewOn && reviewOn < hospitalToday(now)) {
		throw invalidField('/reviewOn', `reviewOn ${reviewOn} is past; it is today or later.`);
	}
}
