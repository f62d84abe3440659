import { asc, desc, eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { NO_LAYERS } from '$lib/domain/bedside/limits/layers';
import { toRfc3339 } from '$lib/domain/core/instant';
import { isSoughtAnew } from '$lib/domain/escalations/holding';
import { notKnown } from '$lib/domain/episodes/may-do-now';
import type { Nameboard, PatientContact } from '$lib/domain/episodes/views';
import { hangingEnds } from '$lib/domain/loose-ends/hanging';
import { inListOrder } from '$lib/domain/lines/stand';
import { standingWound } from '$lib/domain/wounds/stand';
import { accessEpisode, type EpisodeRow } from '../access/access';
import { unseenDeviations } from '../bedside/deviations';
import { listClearances } from '../clearances/queries';
import type { Reader } from '../db';
import { escalations, patients, referrals, threads, units, users } from '../db/schema';
import { openThings } from '../loose-ends/queries';
import { wordingsOf } from '../limits/activities';
import { layersOf } from '../limits/queries';
import { listLines, oxygenOf } from '../lines/queries';
import { listWoundNotes } from '../wounds/queries';
import { visitsOfEpisode } from '../visits/queries';
import { factsOfOne, levelsDecide } from './facts';
import { patientLine } from './list';

/** So many notes of the wound tell how it goes. */
const WOUND_NOTES = 5;

/** Everything on the nameboard of one patient, as far as this person may see it. */
export async function getNameboard(
	db: Reader,
	person: Person,
	episodeId: string,
	now: number
): Promise<Nameboard> {
	const episode = await accessEpisode(db, person, episodeId, 'episode.read');
	const clinical = can(person, 'escalation.read', { unitId: episode.unitId });
	const derived = await factsOfOne(db, episode, now);
	const [who, asks, cleared, unseen, visits, calls, layers, wordings, wounds, lines, oxygen, things] =
		await Promise.all([
			whoAndWhere(db, episode),
			referralsOf(db, episodeId),
			listClearances(db, episodeId, derived.operation?.id ?? null, now),
			clinical ? unseenDeviations(db, episodeId) : [],
			visitsOfEpisode(db, episodeId),
			clinical ? escalationsOf(db, episodeId) : [],
			clinical ? layersOf(db, episode, now) : NO_LAYERS,
			clinical ? wordingsOf(db, episode.unitId) : [],
			clinical ? listWoundNotes(db, episodeId) : [],
			clinical ? listLines(db, episodeId) : [],
			clinical ? oxygenOf(db, [episodeId]) : null,
			openThings(db, [episode.unitId], now)
		]);
	if (!who) {
		throw new Error(`Episode ${episodeId} lost its patient or unit.`);
	}
	const contact = can(person, 'contact.read', { unitId: episode.unitId }) ? contactOf(who.patient) : {};
	return {
		id: episodeId,
		patient: { ...patientLine(who.patient), ...contact },
		unit: who.unit,
		unitId: episode.unitId,
		bed: episode.bed,
		phase: episode.phase,
		operationId: derived.operation?.id ?? null,
		procedure: derived.operation?.procedure ?? null,
		approach: derived.operation?.approach ?? null,
		operatedAt: derived.operation ? toRfc3339(derived.operation.operatedAt) : null,
		postOpDay: derived.postOpDay,
		surgeon: who.surgeon,
		level: episode.level,
		betaBlocked: episode.betaBlocked,
		rhythm: episode.rhythm,
		mayDoNow: levelsDecide(episode, derived) ? derived.mayDoNow : null,
		notKnown: notKnown({ ...episode, precautions: derived.precautions }),
		precautions: derived.precautions,
		nothingByMouth: episode.phase === 'inpatient' && derived.nothingByMouth,
		levelReached: Math.max(episode.level, episode.levelReached),
		wordings,
		wounds: wounds.slice(0, WOUND_NOTES),
		wound: standingWound(wounds),
		lines: inListOrder(lines.filter(({ outAt }) => outAt === null).map(({ kind }) => kind)),
		lineNotes: lines,
		oxygen: oxygen?.get(episodeId) ?? null,
		limits: layers,
		ends: hangingEnds(things, clinical).get(episodeId) ?? [],
		referrals: asks,
		threads: asks.map(({ threadId, service, state }) => ({ id: threadId, service, state })),
		clearances: cleared,
		deviations: unseen,
		visits,
		escalations: calls
	};
}

function contactOf(patient: PatientContact): PatientContact {
	const { phone, language, smsConsent, email, mailConsent, zone } = patient;
	return { phone, language, smsConsent, email, mailConsent, zone };
}

async function whoAndWhere(db: Reader, episode: EpisodeRow) {
	const [row] = await db
		.select({ patient: patients, unit: units.name })
		.from(patients)
		.innerJoin(units, eq(units.id, episode.unitId))
		.where(eq(patients.id, episode.patientId));
	if (!row) {
		return null;
	}
	const [surgeon] = episode.surgeonId
		? await db.select({ id: users.id, name: users.name }).from(users).where(eq(users.id, episode.surgeonId))
		: [];
	return { ...row, surgeon: surgeon ?? null };
}

async function referralsOf(db: Reader, episodeId: string): Promise<Nameboard['referrals']> {
	const rows = await db
		.select({
			id: referrals.id,
			service: referrals.service,
			state: referrals.state,
			threadId: threads.id,
			question: referrals.question,
			askedBy: users.name,
			askedAt: referrals.askedAt
		})
		.from(referrals)
		.innerJoin(threads, eq(threads.referralId, referrals.id))
		.innerJoin(users, eq(users.id, referrals.askedBy))
		.where(eq(referrals.episodeId, episodeId))
		.orderBy(asc(referrals.askedAt));
	return rows.map((row) => ({ ...row, askedAt: toRfc3339(row.askedAt) }));
}

async function escalationsOf(db: Reader, episodeId: string): Promise<Nameboard['escalations']> {
	const rows = await db
		.select({
			id: escalations.id,
			grade: escalations.grade,
			state: escalations.state,
			situation: escalations.situation,
			raisedAt: escalations.raisedAt,
			raisedById: escalations.raisedBy,
			takenBy: users.name,
			nextStepAt: escalations.nextStepAt
		})
		.from(escalations)
		.leftJoin(users, eq(users.id, escalations.takenBy))
		.where(eq(escalations.episodeId, episodeId))
		.orderBy(desc(escalations.raisedAt))
		.limit(20);
	return rows.map(({ nextStepAt, ...row }) => ({
		...row,
		raisedAt: toRfc3339(row.raisedAt),
		notThere: isSoughtAnew({ state: row.state, nextStepAt })
	}));
}
