/** Which thread a deed about a patient belongs into, where nobody named one. */
import type { Actor } from '../access/actor';
import { can } from '../access/can';
import type { ReferralState, Service } from '../core/codes';

type Open = { service: Service; state: ReferralState };

/**
 * The thread of whoever does it: a physiotherapist's session stands where physiotherapy was asked for, not where the
 * speech therapist talks. Who answers no referral writes into the newest accepted thread, else the newest asked.
 *
 * @param threads of one patient, the oldest first
 * @param actor null for what no person does
 */
export function threadOfDeed<T extends Open>(threads: readonly T[], actor: Actor | null): T | null {
	const own =
		actor?.kind === 'person'
			? threads.filter(({ service }) => can(actor, 'referral.answer', { service }))
			: [];
	return newest(own) ?? newest(threads);
}

function newest<T extends Open>(threads: readonly T[]): T | null {
	const inState = (wanted: ReferralState) => threads.findLast(({ state }) => state === wanted);
	return inState('accepted') ?? inState('asked') ?? null;
}
