import { notFound } from '$lib/domain/core/errors';
import type { PhoneEscalation } from '$lib/domain/escalations/views';
import type { Context } from '../context';
import { db } from '../db';
import { getByLink } from './queries';
import { findLink } from './link';

/** What the page of a secret link is made of. */
export interface PhonePage {
	escalation: PhoneEscalation;
	/** True when the browser is signed in as the person whom the link was sent to. */
	signedIn: boolean;
	/** The server's instant, so that a phone with a wrong clock shows the right age. */
	now: number;
}

/**
 * The escalation behind a secret link, for anybody who holds it. Reading changes nothing.
 * @throws Problem `not-found` for a link that is unknown or older than its life
 */
export async function phonePage({ actor, now }: Context, token: string): Promise<PhonePage> {
	const [link, escalation] = await Promise.all([findLink(db(), token), getByLink(db(), token, now)]);
	if (!link) {
		throw notFound('link');
	}
	return { escalation, signedIn: actor?.kind === 'person' && actor.id === link.userId, now };
}
