import { and, desc, eq, inArray } from 'drizzle-orm';
import type { CloseReason } from '$lib/domain/core/codes';
import { isNobodyTold } from '$lib/domain/episodes/close-reasons';
import { mailText } from '$lib/domain/messages/templates';
import { routes } from '$lib/routes';
import type { Tx } from '../db';
import { referrals, type visits } from '../db/schema';
import { env } from '../env';
import type { NewMessage } from '../outbox/enqueue';

const MAIL_LIFE_MS = 24 * 60 * 60 * 1000;

/**
 * Tell whoever referred the patient last that something is booked: a link that opens behind the sign-in, and
 * nothing else. Nobody is told of what they did themselves.
 */
export async function tellReferrer(
	tx: Tx,
	visit: typeof visits.$inferSelect,
	bookedBy: string,
	now: number
): Promise<NewMessage[]> {
	const [referral] = await tx
		.select({ askedBy: referrals.askedBy })
		.from(referrals)
		.where(eq(referrals.episodeId, visit.episodeId))
		.orderBy(desc(referrals.askedAt), desc(referrals.id))
		.limit(1);
	if (!referral || referral.askedBy === bookedBy) {
		return [];
	}
	const link = env().publicUrl + routes.patientVisits(visit.episodeId);
	return [
		mailTo(
			referral.askedBy,
			'referrer',
			link,
			`visit-booked:${visit.id}`,
			{ kind: 'visit', id: visit.id },
			now
		)
	];
}

/** Tell who asked that a referral is closed: how it went stands in its thread, behind the sign-in. */
export function tellReferralClosed(
	{ id, episodeId, askedBy }: Pick<typeof referrals.$inferSelect, 'id' | 'episodeId' | 'askedBy'>,
	threadId: string,
	closedBy: string,
	now: number
): NewMessage[] {
	if (askedBy === closedBy) {
		return [];
	}
	const link = env().publicUrl + routes.thread(episodeId, threadId);
	return [mailTo(askedBy, 'summary', link, `referral-closed:${id}`, { kind: 'referral', id }, now)];
}

/**
 * Tell everybody who referred a patient, and whose referral was not closed before, that the stay is over. A death is
 * told by people and not by a mail; of a stay that never was there is nothing to tell.
 */
export async function tellDischarge(
	tx: Tx,
	episodeId: string,
	closedBy: string,
	reason: CloseReason,
	now: number
): Promise<NewMessage[]> {
	if (isNobodyTold(reason)) {
		return [];
	}
	const open = await tx
		.selectDistinct({ askedBy: referrals.askedBy })
		.from(referrals)
		.where(and(eq(referrals.episodeId, episodeId), inArray(referrals.state, ['asked', 'accepted'])));
	const link = env().publicUrl + routes.patient(episodeId);
	return open
		.filter(({ askedBy }) => askedBy !== closedBy)
		.map(({ askedBy }) =>
			mailTo(
				askedBy,
				'summary',
				link,
				`episode-closed:${episodeId}:${askedBy}`,
				{ kind: 'episode', id: episodeId },
				now
			)
		);
}

function mailTo(
	userId: string,
	template: 'referrer' | 'summary',
	link: string,
	causeKey: string,
	ref: NewMessage['ref'],
	now: number
): NewMessage {
	const { subject, text } = mailText(template, { link });
	return {
		kind: 'mail',
		channel: 'mail',
		causeKey,
		userId,
		subject,
		body: text,
		ref,
		expiresAt: now + MAIL_LIFE_MS
	};
}
