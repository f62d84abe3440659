import { and, asc, eq } from 'drizzle-orm';
import { notFound, Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { messageLanguage, type MessageLanguage } from '$lib/domain/messages/templates/wording';
import type { PageDeed } from '$lib/domain/patient-page/forms';
import type { PatientPage } from '$lib/domain/patient-page/views';
import { isExpected } from '$lib/domain/visits/states';
import type { Context } from '../context';
import { db, type Reader } from '../db';
import { episodes, patientLinks, patients, visits } from '../db/schema';
import { env } from '../env';
import { linkDigest } from '../links';
import { calendarOf } from '../visits/calendar';
import { moveVisit, type MovedVisit } from '../visits/move';
import { write, type Written } from '../write';

/** A visit stays on the page for so long after it was to begin, so that it does not vanish on the way to it. */
const LINGERS_MS = 24 * 60 * 60 * 1000;

/** A link of a patient, and why it opens nothing: nobody knows it, or it has ended. */
type Found = { patient: typeof patients.$inferSelect; link: typeof patientLinks.$inferSelect };

async function findPage(reader: Reader, token: string): Promise<Found | null> {
	const [row] = await reader
		.select({ patient: patients, link: patientLinks })
		.from(patientLinks)
		.innerJoin(episodes, eq(episodes.id, patientLinks.episodeId))
		.innerJoin(patients, eq(patients.id, episodes.patientId))
		.where(eq(patientLinks.tokenHash, linkDigest(token)));
	return row ?? null;
}

/** Whether a token was ever given out, also one that has ended. */
export async function pageExists(token: string): Promise<boolean> {
	return (await findPage(db(), token)) !== null;
}

/** The language of the patient whom a link was sent to, also of one that has ended; English for any other. */
export async function languageOfPage(token: string): Promise<MessageLanguage> {
	return messageLanguage((await findPage(db(), token))?.patient.language ?? null);
}

/**
 * The page behind a link. Reading changes nothing, so that a preview does not either.
 * @throws Problem `not-found` for a link that nobody knows, `link-ended` for one that is over
 */
export async function readPage({ now }: Context, token: string): Promise<PatientPage> {
	const { patient, link } = await openPage(db(), token, now);
	const rows = await visitsOf(db(), link.episodeId, now);
	return {
		language: messageLanguage(patient.language),
		visits: rows.map(({ id, startsAt, minutes, place, state, sequence, patientCancelledAt }) => ({
			id,
			startsAt: toRfc3339(startsAt),
			minutes,
			place,
			state,
			byPatient: state === 'cancelled' && patientCancelledAt !== null,
			sequence
		})),
		expiresAt: toRfc3339(link.expiresAt),
		zone: env().hospital.zone,
		now
	};
}

/**
 * The visits ahead as a calendar file, those that are cancelled too: who fetched an earlier one has them still. Null
 * where there is none: a calendar without an entry is no calendar.
 * @throws Problem as `readPage()`
 */
export async function calendarOfPage({ now }: Context, token: string): Promise<string | null> {
	const { patient, link } = await openPage(db(), token, now);
	const rows = await visitsOf(db(), link.episodeId, now);
	const ahead = rows.filter(({ state }) => isExpected(state) || state === 'cancelled');
	return ahead.length === 0 ? null : calendarOf(ahead, 'PUBLISH', patient, now);
}

/**
 * What a patient says on their page: that they will come, or cannot. The same form sent twice is done once, and a yes
 * after a yes is no mistake.
 * @throws Problem `wrong-state` for a visit that is over or has begun, and as `readPage()`
 */
export async function answerOnPage(
	context: Context,
	token: string,
	{ deed, visit: id, sequence, why }: PageDeed
): Promise<Written<MovedVisit>> {
	const { patient, link } = await openPage(db(), token, context.now);
	// The address of the page is its secret: what is kept of a key names the link and not the way to it.
	const key = context.key && { ...context.key, path: `page:${link.id}` };
	const as = { ...context, actor: { kind: 'patient' as const, id: patient.id }, key };
	return write(as, 'anyone', async (tx) => {
		await openPage(tx, token, context.now);
		const [visit] = await tx
			.select()
			.from(visits)
			.where(and(eq(visits.id, id), eq(visits.episodeId, link.episodeId)));
		if (!visit) {
			throw notFound('visit');
		}
		if (visit.startsAt <= context.now) {
			throw new Problem('wrong-state', 'This visit has begun.', { state: visit.state });
		}
		const move = deed === 'confirm' ? 'confirm' : 'cancel';
		if (visit.sequence !== sequence && isExpected(visit.state)) {
			throw new Problem('wrong-state', 'This visit has moved since the page was opened.', { state: 'moved' });
		}
		return moveVisit(tx, visit, move, 'patient', context.now, why === '' ? null : why, 'page');
	});
}

async function openPage(reader: Reader, token: string, now: number): Promise<Found> {
	const found = await findPage(reader, token);
	if (!found) {
		throw notFound('link');
	}
	if (found.link.revokedAt !== null || found.link.expiresAt <= now) {
		throw new Problem('link-ended');
	}
	return found;
}

async function visitsOf(reader: Reader, episodeId: string, now: number) {
	const rows = await reader
		.select()
		.from(visits)
		.where(eq(visits.episodeId, episodeId))
		.orderBy(asc(visits.startsAt), asc(visits.id));
	return rows.filter(({ startsAt }) => startsAt > now - LINGERS_MS);
}
