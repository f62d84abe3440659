import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import type { Role } from '$lib/domain/core/codes';
import { MINUTE } from '$lib/domain/core/time';
import { rolesAsked } from '$lib/domain/loose-ends/owed-by';
import type { LooseEnd } from '$lib/domain/loose-ends/loose-ends';
import { ago, DEFAULT_LOCALE, duration } from '$lib/format';
import { m } from '$lib/i18n/paraglide/messages';
import { ROLE_WORDS } from '../shell/role-words';

type Owed = Pick<LooseEnd, 'kind' | 'code'>;

/** `surgeon or physician`: whoever of these roles answers first. */
export function anyRole(roles: readonly Role[]): string {
	const words = roles.map((role) => ROLE_WORDS[role]());
	return new Intl.ListFormat(DEFAULT_LOCALE, { type: 'disjunction' }).format(words);
}

/** Whether the answer can be this person's to give. */
export function waitsOn(viewer: Person, owed: Owed, unitId: string): boolean {
	return can(viewer, 'episode.read', { unitId }) && rolesAsked(owed).includes(viewer.role);
}

/** Who owes the answer and for how long: `waiting on the surgeon, 40 min`, or `waiting on you`. */
export function waitingWords(
	owed: Owed,
	since: string,
	reader: { viewer: Person; unitId: string; now: number }
): string {
	const time = elapsed(Date.parse(since), reader.now);
	return waitsOn(reader.viewer, owed, reader.unitId)
		? m.referrals_waiting_on_you({ time })
		: m.referrals_waiting_on({ roles: anyRole(rolesAsked(owed)), time });
}

/** Whole minutes, because a second that ticks is unrest; `just now` before the first. */
export function elapsed(since: number, now: number): string {
	const minutes = Math.floor((now - since) / MINUTE);
	return minutes < 1 ? ago(since, { now }) : duration(minutes * MINUTE);
}
