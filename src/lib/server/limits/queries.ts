import { and, asc, desc, eq, gt, gte, inArray, isNull, lte, or } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import type { Person } from '$lib/domain/access/actor';
import {
	NO_LAYERS,
	setOfUnit,
	type LocalLayers,
	type PatientLimit,
	type UnitChange
} from '$lib/domain/bedside/limits/layers';
import { notFound } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { localDateOf } from '$lib/domain/core/time';
import type { PatientLimitLine, UnitLimits } from '$lib/domain/limits/views';
import { accessEpisode } from '../access/access';
import type { Reader } from '../db';
import { patientLimits, unitLimitChanges, units, users } from '../db/schema';
import { env } from '../env';
import { rangeAt } from './ranges';

/** What lies over the default limits of one patient at an instant: the unit's changes, the patient's own, a range. */
export async function layersOf(
	db: Reader,
	episode: { id: string; unitId: string },
	at: number
): Promise<LocalLayers> {
	const [layers, prescribed] = await Promise.all([
		layersOfMany(db, [episode], at),
		rangeAt(db, episode.id, at)
	]);
	return { ...(layers.get(episode.id) ?? NO_LAYERS), prescribed };
}

/** The same of several patients at once, without what is prescribed, by episode. */
export async function layersOfMany(
	db: Reader,
	episodes: readonly { id: string; unitId: string }[],
	at: number
): Promise<Map<string, LocalLayers>> {
	const [changes, own] = await Promise.all([
		changesOfUnits(db, [...new Set(episodes.map(({ unitId }) => unitId))], at),
		limitsInForce(
			db,
			episodes.map(({ id }) => id),
			at
		)
	]);
	return new Map(
		episodes.map(({ id, unitId }) => [
			id,
			{
				unit: changes.filter((change) => change.unitId === unitId).map(({ unitId: _, ...change }) => change),
				patient: own.filter(({ episodeId }) => episodeId === id).map(({ episodeId: _, ...limit }) => limit)
			}
		])
	);
}

/** The changes of units up to an instant, oldest first. */
async function changesOfUnits(
	db: Reader,
	unitIds: string[],
	at: number
): Promise<(UnitChange & { unitId: string })[]> {
	const { unitId, version, set, key, value, agreedBy, agreedOn } = unitLimitChanges;
	return db
		.select({ unitId, version, set, key, value, agreedBy, agreedOn })
		.from(unitLimitChanges)
		.where(and(inArray(unitId, unitIds), lte(unitLimitChanges.changedAt, at)))
		.orderBy(asc(version));
}

/** The limits of patients that held at an instant. */
async function limitsInForce(
	db: Reader,
	episodeIds: string[],
	at: number
): Promise<(PatientLimit & { episodeId: string })[]> {
	const { episodeId, version, key, value, untilOn } = patientLimits;
	return db
		.select({ episodeId, version, key, value, untilOn, setBy: users.name })
		.from(patientLimits)
		.innerJoin(users, eq(users.id, patientLimits.setBy))
		.where(
			and(
				inArray(episodeId, episodeIds),
				lte(patientLimits.setAt, at),
				or(isNull(patientLimits.endedAt), gt(patientLimits.endedAt, at)),
				gte(untilOn, localDateOf(at, env().hospital.zone))
			)
		)
		.orderBy(asc(version));
}

/** A unit's set and changes, newest first, for whoever is signed in: limits are about no patient. */
export async function unitLimitsOf(db: Reader, unitId: string): Promise<UnitLimits> {
	const [unit] = await db.select({ id: units.id, name: units.name }).from(units).where(eq(units.id, unitId));
	if (!unit) {
		throw notFound('unit');
	}
	const rows = await db
		.select({ change: unitLimitChanges, changedBy: users.name })
		.from(unitLimitChanges)
		.innerJoin(users, eq(users.id, unitLimitChanges.changedBy))
		.where(eq(unitLimitChanges.unitId, unitId))
		.orderBy(desc(unitLimitChanges.version));
	const changes = rows.map(({ change: { unitId: _unit, ...change }, changedBy }) => ({
		...change,
		changedBy,
		changedAt: toRfc3339(change.changedAt)
	}));
	return { unit, inpatientSet: setOfUnit(changes, 'inpatient'), changes };
}

const ender = alias(users, 'ender');

/** Every limit that was ever set for a patient, newest first. */
export async function patientLimitsOf(
	db: Reader,
	person: Person,
	episodeId: string,
	now: number
): Promise<PatientLimitLine[]> {
	await accessEpisode(db, person, episodeId, 'session.read');
	const inForce = await limitsInForce(db, [episodeId], now);
	// A newer limit of the same name takes the place of an older one, which then no longer counts.
	const counting = new Map(inForce.map(({ key, version }) => [key, version]));
	const rows = await db
		.select({ limit: patientLimits, setBy: users.name, endedBy: ender.name })
		.from(patientLimits)
		.innerJoin(users, eq(users.id, patientLimits.setBy))
		.leftJoin(ender, eq(ender.id, patientLimits.endedBy))
		.where(eq(patientLimits.episodeId, episodeId))
		.orderBy(desc(patientLimits.version));
	return rows.map(({ limit: { episodeId: _episode, ...limit }, setBy, endedBy }) => ({
		...limit,
		setBy,
		setAt: toRfc3339(limit.setAt),
		endedBy,
		endedAt: limit.endedAt === null ? null : toRfc3339(limit.endedAt),
		inForce: counting.get(limit.key) === limit.version
	}));
}
