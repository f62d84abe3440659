import { and, eq, gte, isNull, max } from 'drizzle-orm';
import { directionOf, limitsOfPatient, setOfUnit } from '$lib/domain/bedside/limits/layers';
import { limitFault } from '$lib/domain/bedside/limits/ranges';
import { Problem, invalidField, notFound } from '$lib/domain/core/errors';
import { addDays, localDateOf } from '$lib/domain/core/time';
import type { SetPatientLimit } from '$lib/domain/limits/forms';
import { longDay } from '$lib/format';
import { limitLabel } from '$lib/i18n/limit-names';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode, type EpisodeRow } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { patientLimits } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';
import { layersOf } from './queries';
import type { Numbered } from './unit-actions';

/** Longer than this a limit is no exception any more: the unit's own should change. */
export const PATIENT_LIMIT_MAX_DAYS = 90;

/**
 * Narrow or widen a limit for one patient, with a reason and a last day. An earlier one of the same key ends with it:
 * when the new one is taken back, the unit's own holds again and not what somebody had overruled.
 * @throws Problem `invalid` for a number out of range or one that holds already, or a day in the past or too far off
 */
export function setPatientLimit(
	context: PersonContext,
	episodeId: string,
	input: SetPatientLimit
): Promise<Written<Numbered>> {
	return write(context, 'limit.set-for-patient', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'limit.set-for-patient');
		refuseClosed(episode);
		checkDay(input.untilOn, context.now);
		const was = await checkValue(tx, episode, input, context.now);
		const { key, value, reason, untilOn } = input;
		const [id, version] = [newId(), await nextVersion(tx, episodeId)];
		await replaceEarlier(tx, context, episodeId, key);
		await tx.insert(patientLimits).values({
			...{ id, episodeId, version, key, value, reason, untilOn },
			...{ setBy: context.actor.id, setAt: context.now }
		});
		const said = {
			limit: limitLabel(key),
			value,
			was: was ?? m.limits_off(),
			until: longDay(untilOn),
			reason
		};
		const detail = { key, value, was, untilOn, version };
		const body = m.limits_entry_set(said);
		return following(tx, context, episodeId, { id, version }, body, 'limit.set-for-patient', detail);
	});
}

/** End a limit of a patient before its last day: what holds for the unit holds again. */
export function endPatientLimit(context: PersonContext, id: string): Promise<Written<Numbered>> {
	return write(context, 'limit.set-for-patient', async (tx) => {
		const [limit] = await tx.select().from(patientLimits).where(eq(patientLimits.id, id));
		if (!limit) {
			throw notFound('limit');
		}
		await accessEpisode(tx, context.actor, limit.episodeId, 'limit.set-for-patient');
		const [ended] = await tx
			.update(patientLimits)
			.set({ endedBy: context.actor.id, endedAt: context.now })
			.where(and(eq(patientLimits.id, id), isNull(patientLimits.endedAt)))
			.returning({ id: patientLimits.id });
		if (!ended) {
			throw new Problem('wrong-state', 'This limit has ended already.', { state: 'ended' });
		}
		const { key, value, version, episodeId } = limit;
		const body = m.limits_entry_ended({ limit: limitLabel(key), value });
		return following(tx, context, episodeId, { id, version }, body, 'limit.ended-for-patient', {
			key,
			version
		});
	});
}

async function replaceEarlier(
	tx: Tx,
	context: PersonContext,
	episodeId: string,
	key: SetPatientLimit['key']
): Promise<void> {
	await tx
		.update(patientLimits)
		.set({ endedBy: context.actor.id, endedAt: context.now })
		.where(
			and(
				eq(patientLimits.episodeId, episodeId),
				eq(patientLimits.key, key),
				isNull(patientLimits.endedAt),
				// What has lapsed by its own day was ended by nobody.
				gte(patientLimits.untilOn, localDateOf(context.now, env().hospital.zone))
			)
		);
}

/** The number that held before; null where the rule was off. */
async function checkValue(
	tx: Tx,
	episode: EpisodeRow,
	{ key, value, untilOn }: SetPatientLimit,
	now: number
): Promise<number | null> {
	const fault = limitFault(key, value);
	if (fault !== null) {
		throw invalidField('/value', fault);
	}
	const layers = await layersOf(tx, episode, now);
	const holds = limitsOfPatient(setOfUnit(layers.unit, episode.phase), layers).limits[key];
	// The same number with another last day is what a limit needs that should hold on, or end sooner.
	const own = layers.patient.filter((limit) => limit.key === key);
	const newDay = own.length > 0 && own.every((limit) => limit.untilOn !== untilOn);
	if (holds && directionOf(holds, value) === null && !newDay) {
		throw invalidField('/value', m.limits_problem_holds({ value }));
	}
	return holds?.value ?? null;
}

function checkDay(untilOn: string, now: number): void {
	const today = localDateOf(now, env().hospital.zone);
	const last = addDays(today, PATIENT_LIMIT_MAX_DAYS);
	if (untilOn < today || untilOn > last) {
		const days = { day: longDay(untilOn), first: longDay(today), last: longDay(last) };
		throw invalidField('/untilOn', m.limits_problem_until(days));
	}
}

function refuseClosed(episode: EpisodeRow): void {
	if (episode.closedAt !== null) {
		throw new Problem('wrong-state', 'The episode is closed.', { state: 'closed' });
	}
}

async function nextVersion(tx: Tx, episodeId: string): Promise<number> {
	const [last] = await tx
		.select({ version: max(patientLimits.version) })
		.from(patientLimits)
		.where(eq(patientLimits.episodeId, episodeId));
	return (last?.version ?? 0) + 1;
}

async function following(
	tx: Tx,
	context: PersonContext,
	episodeId: string,
	result: Numbered,
	body: string,
	action: 'limit.set-for-patient' | 'limit.ended-for-patient',
	detail: Record<string, string | number | null>
): Promise<Change<Numbered>> {
	const threadId = await threadForDeed(tx, episodeId, context.actor);
	return {
		result,
		audit: { action, objectKind: 'limit', objectId: result.id, episodeId, detail },
		entries: threadId === null ? [] : [{ threadId, kind: 'event', body }],
		events: [{ topic: 'episode', kind: 'limits-changed', id: episodeId, episodeId }]
	};
}
