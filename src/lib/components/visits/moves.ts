import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { localDateOf } from '$lib/domain/core/time';
import { isExpected, movesOf, type VisitMove } from '$lib/domain/visits/states';
import type { VisitItem } from '$lib/domain/visits/views';
import type { Reader } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';

/** What can be done about a visit from a list. */
export type VisitDeed = VisitMove | 'follow-up' | 'move';

/** Whether another time can be given to a visit: it is expected and has not begun, and the role plans visits. */
export function mayReschedule(
	{ state, startsAt }: Pick<VisitItem, 'state' | 'startsAt'>,
	viewer: Person,
	{ now }: Reader
): boolean {
	return isExpected(state) && now < Date.parse(startsAt) && can(viewer, 'visit.plan');
}

export const MOVE_WORDS: Record<VisitMove, () => string> = {
	confirm: m.visits_move_confirm,
	cancel: m.visits_move_cancel,
	attend: m.visits_move_attend,
	miss: m.visits_move_miss,
	reopen: m.visits_move_reopen
};

const PERMISSIONS = {
	confirm: 'visit.plan',
	cancel: 'visit.plan',
	attend: 'visit.attend',
	miss: 'visit.attend',
	reopen: 'visit.attend'
} as const;

/**
 * The moves to offer, the likeliest first: what the state allows and the role may, and what makes sense at this
 * time. Whether somebody came is asked from the day of the visit on; before its time it can be confirmed, until
 * its day is over cancelled. The API takes any move that the state allows.
 */
export function offeredMoves(
	visit: Pick<VisitItem, 'state' | 'startsAt'>,
	viewer: Person,
	{ now, zone }: Reader
): VisitMove[] {
	const startsAt = Date.parse(visit.startsAt);
	const [today, day] = [localDateOf(now, zone), localDateOf(startsAt, zone)];
	const makesSense: Record<VisitMove, boolean> = {
		confirm: now < startsAt,
		cancel: today <= day,
		attend: today >= day,
		miss: today >= day,
		reopen: true
	};
	const offered = movesOf(visit.state).filter((move) => makesSense[move] && can(viewer, PERMISSIONS[move]));
	return offered.toSorted((a, b) => likelihood(b, today === day) - likelihood(a, today === day));
}

/** On the day itself people arrive; what they said before matters less. */
function likelihood(move: VisitMove, onTheDay: boolean): number {
	return { confirm: onTheDay ? 1 : 3, attend: onTheDay ? 3 : 2, miss: 1, cancel: 0, reopen: 0 }[move];
}
