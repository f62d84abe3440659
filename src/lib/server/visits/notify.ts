import { desc, eq } from 'drizzle-orm';
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
	const { subject, text } = mailText('referrer', { link });
	return [
		{
			kind: 'mail',
			channel: 'mail',
			causeKey: `visit-booked:${visit.id}`,
			userId: referral.askedBy,
			subject,
			body: text,
			ref: { kind: 'visit', id: visit.id },
			expiresAt: now + MAIL_LIFE_MS
		}
	];
}
