import { eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can, type Permission, type Subject } from '$lib/domain/access/can';
import { Problem, notFound } from '$lib/domain/core/errors';
import type { Reader } from '../db';
import {
	clearances,
	deviations,
	episodes,
	escalations,
	lines,
	referrals,
	threads,
	users,
	visits
} from '../db/schema';

/**
 * Fetch with permission or not at all. These functions are the only way from an identifier in a request to a row.
 * What is missing and what lies outside the person's units look the same (404); a row that they may see but a
 * deed that their role may not do is 403.
 */

export type EpisodeRow = typeof episodes.$inferSelect;

export async function accessEpisode(
	db: Reader,
	person: Person,
	episodeId: string,
	permission: Permission,
	subject: Subject = {}
): Promise<EpisodeRow> {
	const [row] = await db.select().from(episodes).where(eq(episodes.id, episodeId));
	return allowed(person, row, row?.unitId, permission, 'episode', subject);
}

export async function accessReferral(db: Reader, person: Person, id: string, permission: Permission) {
	const [row] = await db
		.select({ referral: referrals, episode: episodes, threadId: threads.id })
		.from(referrals)
		.innerJoin(episodes, eq(episodes.id, referrals.episodeId))
		.innerJoin(threads, eq(threads.referralId, referrals.id))
		.where(eq(referrals.id, id));
	const subject = { service: row?.referral.service };
	return allowed(person, row, row?.episode.unitId, permission, 'referral', subject);
}

export async function accessThread(db: Reader, person: Person, id: string, permission: Permission) {
	const [row] = await db
		.select({ thread: threads, referral: referrals, episode: episodes })
		.from(threads)
		.innerJoin(referrals, eq(referrals.id, threads.referralId))
		.innerJoin(episodes, eq(episodes.id, threads.episodeId))
		.where(eq(threads.id, id));
	return allowed(person, row, row?.episode.unitId, permission, 'thread');
}

export async function accessClearance(db: Reader, person: Person, id: string, permission: Permission) {
	const [row] = await db
		.select({ clearance: clearances, episode: episodes })
		.from(clearances)
		.innerJoin(episodes, eq(episodes.id, clearances.episodeId))
		.where(eq(clearances.id, id));
	const subject = { clearanceKind: row?.clearance.kind };
	return allowed(person, row, row?.episode.unitId, permission, 'clearance', subject);
}

/** Something done without its clearance belongs to the kind that it lacked. */
export async function accessDeviation(db: Reader, person: Person, id: string, permission: Permission) {
	const [row] = await db
		.select({ deviation: deviations, episode: episodes })
		.from(deviations)
		.innerJoin(episodes, eq(episodes.id, deviations.episodeId))
		.where(eq(deviations.id, id));
	const subject = { clearanceKind: row?.deviation.kind };
	return allowed(person, row, row?.episode.unitId, permission, 'deviation', subject);
}

/** An escalation belongs to the unit where the patient lies now. */
export async function accessEscalation(db: Reader, person: Person, id: string, permission: Permission) {
	const [row] = await db
		.select({ escalation: escalations, episode: episodes })
		.from(escalations)
		.innerJoin(episodes, eq(episodes.id, escalations.episodeId))
		.where(eq(escalations.id, id));
	return allowed(person, row, row?.episode.unitId, permission, 'escalation');
}

/** A line with the name of whoever noted it out; null while it is in. */
export async function accessLine(db: Reader, person: Person, id: string, permission: Permission) {
	const [row] = await db
		.select({ kind: lines.kind, episodeId: lines.episodeId, outBy: users.name, unitId: episodes.unitId })
		.from(lines)
		.innerJoin(episodes, eq(episodes.id, lines.episodeId))
		.leftJoin(users, eq(users.id, lines.outBy))
		.where(eq(lines.id, id));
	return allowed(person, row, row?.unitId, permission, 'line');
}

export async function accessVisit(db: Reader, person: Person, id: string, permission: Permission) {
	const [row] = await db
		.select({ visit: visits, episode: episodes })
		.from(visits)
		.innerJoin(episodes, eq(episodes.id, visits.episodeId))
		.where(eq(visits.id, id));
	return allowed(person, row, row?.episode.unitId, permission, 'visit');
}

function allowed<T>(
	person: Person,
	row: T | undefined,
	unitId: string | undefined,
	permission: Permission,
	what: string,
	subject: Subject = {}
): T {
	if (row === undefined || unitId === undefined || !can(person, 'episode.read', { unitId })) {
		// A role that may see no patient at all is told so; everybody else learns nothing.
		if (!can(person, 'episode.read')) {
			throw new Problem('not-allowed', `The role ${person.role} sees no patients.`);
		}
		throw notFound(what);
	}
	if (!can(person, permission, { ...subject, unitId })) {
		throw new Problem('not-allowed', `The role ${person.role} may not do that (${permission}).`);
	}
	return row;
}
