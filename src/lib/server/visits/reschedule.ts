import { eq } from 'drizzle-orm';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { VisitLine } from '$lib/domain/episodes/views';
import type { LiveEvent } from '$lib/domain/live/events';
import { startProblem, type Reschedule } from '$lib/domain/visits/forms';
import { planVisit } from '$lib/domain/visits/series';
import { isExpected } from '$lib/domain/visits/states';
import { accessVisit } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { visits, type patients } from '../db/schema';
import { env } from '../env';
import type { NewMessage } from '../outbox/enqueue';
import { dropWaiting } from '../outbox/reminders';
import { write, type Written } from '../write';
import { refuseClosedDay } from './closed-days';
import { visitLine } from './items';
import type { VisitRow } from './move';
import { findPlace, type Place } from './plan';
import { patientOfEpisode, remindOf } from './remind';
import { requireRoom } from './room';
import { tellLength, tellMoved, waysOf, type Way } from './tell-patient';
import { carryReminders } from './waiting-reminders';
import { startKnown, toBeTold } from './untold';
import { rescheduledText } from './words';

type PatientRow = typeof patients.$inferSelect;

/** A visit at its new time; `told` are the ways by which the patient hears of it, none where somebody has to call. */
export interface Rescheduled extends VisitLine {
	sequence: number;
	told: Way[];
}

/**
 * Give a visit another time, length or place. It stays the same visit, so that calendars find it. At another time or
 * place it waits for the patient's yes anew; reminders of the old one are dropped and those of the new one planned, and
 * the patient is told, all in one transaction. Where its length alone changes, calendars are told.
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
		const { dropped, reminders, news } = isElsewhere(before, visit)
			? await followMove(tx, before, visit, patient, context.now)
			: await followLength(tx, before, visit, patient, context.now);
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

/** Whether what the patient was told of it holds no more; how long it takes was not told. */
function isElsewhere(before: VisitRow, after: VisitRow): boolean {
	return before.startsAt !== after.startsAt || before.unitId !== after.unitId;
}

type Follows = { dropped: LiveEvent[]; reminders: NewMessage[]; news: NewMessage[] };

async function followMove(
	tx: Tx,
	before: VisitRow,
	visit: VisitRow,
	patient: PatientRow,
	now: number
): Promise<Follows> {
	return {
		dropped: await dropWaiting(tx, visit.id, 'visit has moved'),
		reminders: await remindOf(tx, visit, patient, now),
		news: tellMoved(visit, before.startsAt, patient, now)
	};
}

/** Time and place stay, and so do the yes, the reminders and what is on its way: only calendars have to hear of it. */
async function followLength(
	tx: Tx,
	before: VisitRow,
	visit: VisitRow,
	patient: PatientRow,
	now: number
): Promise<Follows> {
	await carryReminders(tx, before, visit.sequence);
	return { dropped: [], reminders: [], news: tellLength(visit, patient, now) };
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
	const after = { ...before, ...planned, unitId: place.id, place: place.name, sequence: before.sequence + 1 };
	if (!isElsewhere(before, after)) {
		return after;
	}
	await refuseClosedDay(tx, planned.localDate, '/startsAt');
	const toTell = toBeTold(now, await startKnown(tx, before));
	return { ...after, ...toTell, state: 'planned', decidedAt: null, reason: null };
}
