import { eq } from 'drizzle-orm';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { VisitLine } from '$lib/domain/episodes/views';
import { startProblem, type Reschedule } from '$lib/domain/visits/forms';
import { planVisit } from '$lib/domain/visits/series';
import { isExpected } from '$lib/domain/visits/states';
import { accessVisit } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { visits } from '../db/schema';
import { env } from '../env';
import { dropWaiting } from '../outbox/reminders';
import { write, type Written } from '../write';
import { refuseClosedDay } from './closed-days';
import { visitLine } from './items';
import type { VisitRow } from './move';
import { findPlace, type Place } from './plan';
import { patientOfEpisode, remindOf } from './remind';
import { requireRoom } from './room';
import { tellMoved, waysOf, type Way } from './tell-patient';
import { rescheduledText } from './words';

/** A visit at its new time; `told` are the ways by which the patient hears of it, none where somebody has to call. */
export interface Rescheduled extends VisitLine {
	sequence: number;
	told: Way[];
}

/**
 * Give a visit another time, length or place. It stays the same visit, so that calendars find it, and waits for the
 * patient's yes anew; reminders of the old time are dropped and those of the new one planned, and the patient is
 * told, all in one transaction.
 * @throws Problem `wrong-state` for a visit that is over or has begun, `invalid` naming field and value,
 * `visit-overlaps` and `place-full` when there is no room
 */
export function rescheduleVisit(
	context: PersonContext,
	id: string,
	input: Reschedule
): Promise<Written<Rescheduled>> {
	return write(context, 'visit.plan', async (tx) => {
		const { visit: before } = await accessVisit(tx, context.actor, id, 'visit.plan');
		refuseOver(before, context.now);
		const visit = await changed(tx, before, input, context.now);
		const patient = await patientOfEpisode(tx, visit.episodeId);
		const place = { id: visit.unitId, name: visit.place };
		await requireRoom(tx, patient.id, place, [visit], context.now, id);
		await tx.update(visits).set(visit).where(eq(visits.id, id));
		const dropped = await dropWaiting(tx, id, 'visit has moved');
		const reminders = await remindOf(tx, visit, patient, context.now);
		const news = tellMoved(visit, before.startsAt, patient, context.now);
		const { episodeId } = visit;
		const threadId = await threadForDeed(tx, episodeId, context.actor);
		const body = rescheduledText(before, visit, input.reason ?? null, context.now);
		return {
			result: { ...visitLine(visit), sequence: visit.sequence, told: waysOf(news) },
			audit: {
				action: 'visit.moved',
				objectKind: 'visit',
				objectId: id,
				episodeId,
				detail: {
					from: toRfc3339(before.startsAt),
					to: toRfc3339(visit.startsAt),
					sequence: visit.sequence,
					told: waysOf(news).join(',')
				}
			},
			entries: threadId ? [{ threadId, kind: 'event', body, ref: { kind: 'visit', id } }] : [],
			events: [{ topic: 'visit', kind: 'moved', id, episodeId }, ...dropped],
			messages: [...reminders, ...news]
		};
	});
}

function refuseOver({ state, startsAt }: VisitRow, now: number): void {
	if (!isExpected(state)) {
		throw new Problem('wrong-state', `A visit that is ${state} cannot be moved: book another one.`, {
			state
		});
	}
	if (startsAt <= now) {
		const detail = 'This visit has begun: say whether the patient came, and book another one.';
		throw new Problem('wrong-state', detail, { state });
	}
}

/** The visit as it is to be. */
async function changed(tx: Tx, before: VisitRow, input: Reschedule, now: number): Promise<VisitRow> {
	const { zone } = env().hospital;
	const place: Place =
		input.place === undefined
			? { id: before.unitId, name: before.place }
			: await findPlace(tx, input.place, '/place');
	const planned = planVisit(input.startsAt, input.minutes ?? before.minutes, zone);
	const problem = startProblem(planned.startsAt, now, zone);
	if (problem !== null) {
		throw invalidField('/startsAt', problem);
	}
	const same = planned.startsAt === before.startsAt && planned.minutes === before.minutes;
	if (same && place.id === before.unitId) {
		throw invalidField(
			'/startsAt',
			`startsAt is ${toRfc3339(planned.startsAt)}: the visit is at that time already.`
		);
	}
	await refuseClosedDay(tx, planned.localDate, '/startsAt');
	return {
		...before,
		...planned,
		unitId: place.id,
		place: place.name,
		state: 'planned',
		decidedAt: null,
		reason: null,
		sequence: before.sequence + 1
	};
}
