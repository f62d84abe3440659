import { and, eq, isNotNull, isNull } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import type { VisitLine } from '$lib/domain/episodes/views';
import type { BookVisits } from '$lib/domain/visits/forms';
import type { PlannedVisit } from '$lib/domain/visits/series';
import { visitAfter, type VisitMove } from '$lib/domain/visits/states';
import { accessEpisode, accessVisit, type EpisodeRow } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { visits } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import type { NewMessage } from '../outbox/enqueue';
import { write, type Written } from '../write';
import { moveVisit, type MovedVisit, type VisitRow } from './move';
import { closedDates, refuseClosedDay } from './closed-days';
import { takesVisits } from './end-all';
import { tellReferrer } from './notify';
import { findPlace, plannedVisits } from './plan';
import { visitLine } from './items';
import { patientOfEpisode, remindOf } from './remind';
import { requireRoom } from './room';
import { tellBooked } from './tell-patient';
import { NOTHING_TO_TELL } from './untold';
import { bookedText } from './words';

/**
 * Book one visit or a series for a patient. Reminders are planned, the thread says it, and the referrer gets a
 * mail with a link, all in one transaction. A visit that the patient had cancelled counts as followed up.
 * @throws Problem `invalid` naming field, value and limit, `visit-overlaps` and `place-full` when there is no room
 */
export function bookVisits(
	context: PersonContext,
	episodeId: string,
	input: BookVisits
): Promise<Written<{ items: VisitLine[] }>> {
	return write(context, 'visit.plan', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'visit.plan');
		if (!takesVisits(episode)) {
			throw new Problem(
				'wrong-state',
				'The episode is closed and its visits are over: no visit can be booked in it.',
				{
					state: 'closed'
				}
			);
		}
		const { booked, messages } = await book(tx, context, episodeId, input);
		const [first] = booked;
		if (!first) {
			throw new Error('A booking without a visit.');
		}
		await followUpAll(tx, context, episodeId);
		const mails = await tellReferrer(tx, first, context.actor.id, context.now);
		const threadId = await threadForDeed(tx, episodeId, context.actor);
		const body = bookedText(booked, context.now);
		return {
			result: { items: booked.map(visitLine) },
			audit: {
				action: 'visit.booked',
				objectKind: 'visit',
				objectId: first.id,
				episodeId,
				detail: { count: booked.length, seriesId: first.seriesId }
			},
			entries: threadId ? [{ threadId, kind: 'event', body, ref: { kind: 'visit', id: first.id } }] : [],
			events: [{ topic: 'visit', kind: 'booked', id: first.id, episodeId }],
			messages: [...messages, ...mails]
		};
	});
}

async function book(tx: Tx, context: PersonContext, episodeId: string, input: BookVisits) {
	const { now, actor } = context;
	const unit = await findPlace(tx, input.place, input.kind === 'single' ? '/place' : '/series/place');
	const patient = await patientOfEpisode(tx, episodeId);
	const seriesId = input.kind === 'series' ? newId() : null;
	const booked: VisitRow[] = [];
	const messages: NewMessage[] = [];
	const wanted = plannedVisits(input, env().hospital.zone, now, await closedDates(tx));
	if (input.kind === 'single') {
		await refuseClosedDay(tx, wanted[0]?.localDate ?? '', '/startsAt');
	}
	await requireRoom(tx, patient.id, unit, wanted, now);
	for (const planned of wanted) {
		const visit = newVisit(planned, unit, { episodeId, seriesId, bookedBy: actor.id, bookedAt: now });
		await tx.insert(visits).values(visit);
		booked.push(visit);
		messages.push(...(await remindOf(tx, visit, patient, now)));
	}
	return { booked, messages: [...messages, ...tellBooked(booked, patient, now)] };
}

function newVisit(
	planned: PlannedVisit,
	unit: { id: string; name: string },
	rest: Pick<VisitRow, 'episodeId' | 'seriesId' | 'bookedBy' | 'bookedAt'>
): VisitRow {
	return {
		id: newId(),
		...planned,
		...rest,
		sequence: 0,
		unitId: unit.id,
		place: unit.name,
		state: 'planned',
		reason: null,
		decidedAt: null,
		patientCancelledAt: null,
		followedUpAt: null,
		followedUpBy: null,
		...NOTHING_TO_TELL
	};
}

/** The patient will come; staff know it from a call or at the desk. */
export function confirmVisit(context: PersonContext, id: string) {
	return moveByStaff(context, id, 'confirm', 'visit.plan', null);
}

export function cancelVisit(context: PersonContext, id: string, reason: string | null) {
	return moveByStaff(context, id, 'cancel', 'visit.plan', reason);
}

export function attendVisit(context: PersonContext, id: string, reason: string | null = null) {
	return moveByStaff(context, id, 'attend', 'visit.attend', reason);
}

export function missVisit(context: PersonContext, id: string, reason: string | null) {
	return moveByStaff(context, id, 'miss', 'visit.attend', reason);
}

/** What was marked as attended or missed was not so: it is planned again. */
export function reopenVisit(context: PersonContext, id: string, reason: string) {
	return moveByStaff(context, id, 'reopen', 'visit.attend', reason);
}

function moveByStaff(
	context: PersonContext,
	id: string,
	move: VisitMove,
	permission: 'visit.plan' | 'visit.attend',
	reason: string | null
): Promise<Written<MovedVisit>> {
	return write(context, permission, async (tx) => {
		const { visit, episode } = await accessVisit(tx, context.actor, id, permission);
		if (move === 'reopen') {
			await requireToBeExpected(tx, visit, episode, context.now);
		}
		return moveVisit(tx, visit, move, 'staff', context.now, reason);
	});
}

/** What was given up by a mark may have gone to somebody else since, and the stay may be over. */
async function requireToBeExpected(tx: Tx, visit: VisitRow, episode: EpisodeRow, now: number): Promise<void> {
	if (visitAfter(visit.state, 'reopen') === null) {
		return;
	}
	if (!takesVisits(episode)) {
		const detail = 'The episode is closed and its visits are over: no visit in it can be planned again.';
		throw new Problem('wrong-state', detail, { state: 'closed' });
	}
	if (visit.startsAt > now) {
		const { patientId } = episode;
		await requireRoom(tx, patientId, { id: visit.unitId, name: visit.place }, [visit], now, visit.id);
	}
}

/** Nothing more is to be done about a visit that the patient cancelled: they were called, or want no other time. */
export function followUpVisit(context: PersonContext, id: string): Promise<Written<{ id: string }>> {
	return write(context, 'visit.plan', async (tx) => {
		const { visit } = await accessVisit(tx, context.actor, id, 'visit.plan');
		if (visit.patientCancelledAt === null || visit.followedUpAt !== null) {
			throw new Problem('wrong-state', 'Nothing waits to be followed up about this visit.', {
				state: visit.state
			});
		}
		await tx
			.update(visits)
			.set({ followedUpAt: context.now, followedUpBy: context.actor.id })
			.where(eq(visits.id, id));
		const { episodeId } = visit;
		return {
			result: { id },
			audit: { action: 'visit.followed-up', objectKind: 'visit', objectId: id, episodeId },
			events: [{ topic: 'visit', kind: 'followed-up', id, episodeId }]
		};
	});
}

async function followUpAll(tx: Tx, { now, actor }: PersonContext, episodeId: string): Promise<void> {
	await tx
		.update(visits)
		.set({ followedUpAt: now, followedUpBy: actor.id })
		.where(
			and(eq(visits.episodeId, episodeId), isNotNull(visits.patientCancelledAt), isNull(visits.followedUpAt))
		);
}
