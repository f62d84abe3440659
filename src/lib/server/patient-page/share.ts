import { and, desc, eq, gt, isNull } from 'drizzle-orm';
import { invalidField, notFound, Problem } from '$lib/domain/core/errors';
import { nextWithinHours } from '$lib/domain/core/hours';
import { toRfc3339 } from '$lib/domain/core/instant';
import { HOUR } from '$lib/domain/core/time';
import { mailProblem, textProblem, type ReachProblem } from '$lib/domain/messages/reach';
import { mailText, smsText } from '$lib/domain/messages/templates';
import type { PageWay } from '$lib/domain/patient-page/forms';
import type { PageLinkLine, PageSharing } from '$lib/domain/patient-page/views';
import { REMINDER_HOURS } from '$lib/domain/visits/reminders';
import { accessEpisode } from '../access/access';
import type { PersonContext } from '../context';
import { db, type Reader, type Tx } from '../db';
import { outbox, patientLinks, type patients } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { aroundLink, linkDigest, linkToken } from '../links';
import type { NewMessage } from '../outbox/enqueue';
import { takesVisits } from '../visits/end-all';
import { patientOfEpisode } from '../visits/remind';
import { write, type Written } from '../write';

type PatientRow = typeof patients.$inferSelect;

/** Twelve weeks of visits and a little more. */
export const PAGE_LIFE_MS = 90 * 24 * HOUR;
const MESSAGE_LIFE_MS = 24 * HOUR;

/**
 * Send a patient the link to their page. Links that were sent before end, so that only the newest message works. The
 * secret is made at the moment of sending and its digest alone is stored.
 * @throws Problem `invalid` where the patient has no number or address, or does not want to be written to by it
 */
export function sendPage(
	context: PersonContext,
	episodeId: string,
	way: PageWay
): Promise<Written<{ id: string; way: PageWay; expiresAt: string }>> {
	return write(context, 'visit.plan', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'visit.plan');
		if (!takesVisits(episode)) {
			throw new Problem(
				'wrong-state',
				'The episode is closed and its visits are over: no link can be sent.',
				{
					state: 'closed'
				}
			);
		}
		const patient = await patientOfEpisode(tx, episodeId);
		refuseWithoutConsent(patient, way);
		const { now, actor } = context;
		await endLinks(tx, episodeId, actor.id, now);
		const id = newId();
		const expiresAt = now + PAGE_LIFE_MS;
		const tokenHash = linkDigest(linkToken(id));
		await tx
			.insert(patientLinks)
			.values({ id, tokenHash, episodeId, way, createdBy: actor.id, createdAt: now, expiresAt });
		return {
			result: { id, way, expiresAt: toRfc3339(expiresAt) },
			audit: {
				action: 'patient-page.sent',
				objectKind: 'patient-page',
				objectId: id,
				episodeId,
				detail: { way }
			},
			events: [{ topic: 'visit', kind: 'page-sent', id, episodeId }],
			messages: [messageWith(id, episodeId, patient, way, now)]
		};
	});
}

/**
 * End a link at once: a telephone was lost, or somebody else reads the mails.
 * @throws Problem `not-found` outside the person's units, `wrong-state` for a link that has ended
 */
export function endPage(context: PersonContext, id: string): Promise<Written<{ id: string }>> {
	return write(context, 'visit.plan', async (tx) => {
		const [link] = await tx.select().from(patientLinks).where(eq(patientLinks.id, id));
		if (!link) {
			throw notFound('link');
		}
		const { episodeId } = link;
		await accessEpisode(tx, context.actor, episodeId, 'visit.plan');
		if (link.revokedAt !== null || link.expiresAt <= context.now) {
			throw new Problem('wrong-state', 'This link opens nothing any more.', { state: 'ended' });
		}
		await endLinks(tx, episodeId, context.actor.id, context.now);
		return {
			result: { id },
			audit: { action: 'patient-page.ended', objectKind: 'patient-page', objectId: id, episodeId },
			events: [{ topic: 'visit', kind: 'page-ended', id, episodeId }]
		};
	});
}

/**
 * Whether the patient has a link to their page, and by which ways one can be sent.
 * @throws Problem `not-found` outside the person's units
 */
export async function sharingOf({ actor, now }: PersonContext, episodeId: string): Promise<PageSharing> {
	await accessEpisode(db(), actor, episodeId, 'visit.read');
	const patient = await patientOfEpisode(db(), episodeId);
	return {
		link: await openLinkOf(db(), episodeId, now),
		ways: [
			{ way: 'sms', problem: textProblem(patient) },
			{ way: 'mail', problem: mailProblem(patient) }
		]
	};
}

/** The link that opens the patient's page now; null when there is none. */
export async function openLinkOf(
	reader: Reader,
	episodeId: string,
	now: number
): Promise<PageLinkLine | null> {
	const [row] = await reader
		.select({ link: patientLinks, message: outbox.state })
		.from(patientLinks)
		.innerJoin(outbox, eq(outbox.linkId, patientLinks.id))
		.where(
			and(
				eq(patientLinks.episodeId, episodeId),
				isNull(patientLinks.revokedAt),
				gt(patientLinks.expiresAt, now)
			)
		)
		.orderBy(desc(patientLinks.createdAt), desc(patientLinks.id))
		.limit(1);
	if (!row) {
		return null;
	}
	const { id, way, createdAt, expiresAt } = row.link;
	return { id, way, createdAt: toRfc3339(createdAt), expiresAt: toRfc3339(expiresAt), message: row.message };
}

async function endLinks(tx: Tx, episodeId: string, userId: string, now: number): Promise<void> {
	await tx
		.update(patientLinks)
		.set({ revokedAt: now, revokedBy: userId })
		.where(and(eq(patientLinks.episodeId, episodeId), isNull(patientLinks.revokedAt)));
}

const PROBLEMS: Record<ReachProblem, string> = {
	'no-number': 'no telephone number of the patient is known.',
	'no-address': 'no e-mail address of the patient is known.',
	'opted-out': 'the patient asked for no more texts.',
	'no-consent': 'the patient has not consented to it.'
};

function refuseWithoutConsent(patient: PatientRow, way: PageWay): void {
	const problem = way === 'sms' ? textProblem(patient) : mailProblem(patient);
	if (problem !== null) {
		throw invalidField('/way', `way is ${way}: ${PROBLEMS[problem]}`);
	}
}

function messageWith(
	linkId: string,
	episodeId: string,
	patient: PatientRow,
	way: PageWay,
	now: number
): NewMessage {
	const { name: sender, phone } = env().hospital;
	const fields = { sender, phone };
	const base = {
		kind: 'page' as const,
		channel: way,
		causeKey: `patient-page:${linkId}`,
		patientId: patient.id,
		linkId,
		ref: { kind: 'page' as const, id: episodeId }
	};
	if (way === 'mail') {
		const { subject, text } = mailText('page-link', { ...fields, link: '{link}' }, patient.language);
		return { ...base, subject, body: text, expiresAt: now + MESSAGE_LIFE_MS };
	}
	const notBefore = nextWithinHours(now, patient.zone, REMINDER_HOURS);
	const body = aroundLink((link) => smsText('page-link', { ...fields, link }, patient.language));
	return { ...base, body, notBefore, expiresAt: notBefore + MESSAGE_LIFE_MS };
}
