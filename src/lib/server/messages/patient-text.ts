import { and, asc, desc, eq, gt, inArray, isNotNull, or, sql } from 'drizzle-orm';
import { gatewayStops, readPatientReply } from '$lib/domain/messages/reply';
import type { SmsFields, SmsTemplate } from '$lib/domain/messages/templates';
import type { VisitState } from '$lib/domain/core/codes';
import type { Reader, Tx } from '../db';
import { episodes, outbox, patients, reminders, visits } from '../db/schema';
import { moveVisit, type VisitRow } from '../visits/move';
import type { PatientRow } from './sender';
import { answerTo, senderFields, stopHeardKey, type ReceivedText, type Understood } from './understood';

/** One automatic 'a person reads this' in so many hours: a telephone that answers by itself must not talk with us. */
const PERSON_READS_EVERY_MS = 12 * 60 * 60 * 1000;

/** Texts that come within so long of each other are read together: an answer to them may be to either. */
const AT_ONCE_MS = 60 * 60 * 1000;

/** Do what a patient's text asks for, or leave it to a person. */
export async function onPatientText(tx: Tx, patient: PatientRow, text: ReceivedText): Promise<Understood> {
	const understoodAs = readPatientReply(text.body);
	const answer = <T extends SmsTemplate>(template: T, fields: SmsFields<T>, causeKey?: string) => ({
		messages: [
			answerTo(text, { patientId: patient.id }, template, fields, { language: patient.language, causeKey })
		]
	});
	switch (understoodAs) {
		case 'yes':
			return onYes(tx, patient, text);
		case 'no':
			return onNo(tx, patient, text);
		case 'stop':
			await optOut(tx, [patient.id], text.now);
			// Where the gateway has understood it too, it sends the last text itself and would refuse ours.
			return gatewayStops(text.body) || patient.smsOptedOutAt !== null
				? { understoodAs, handled: true }
				: {
						understoodAs,
						handled: true,
						change: answer('texts-stopped', senderFields(), stopHeardKey(patient.id, text.now))
					};
		case 'start':
			// Asking for texts is consent in the patient's own words.
			await tx
				.update(patients)
				.set({ smsOptedOutAt: null, smsConsent: true })
				.where(eq(patients.id, patient.id));
			return { understoodAs, handled: true, change: answer('texts-started', senderFields()) };
		case 'help':
			return { understoodAs, handled: true, change: answer('texts-help', senderFields()) };
		case 'other': {
			const once = `person-reads:${patient.id}:${Math.floor(text.now / PERSON_READS_EVERY_MS)}`;
			return { understoodAs, handled: false, change: answer('person-reads', senderFields(), once) };
		}
	}
}

/** YES confirms the next visit that was reminded of and not confirmed; a second YES is thanked again. */
async function onYes(tx: Tx, patient: PatientRow, text: ReceivedText): Promise<Understood> {
	const [open] = await remindedVisits(tx, patient.id, ['planned'], text.now);
	if (open) {
		return moved(tx, patient, text, open, 'confirm');
	}
	const [confirmed] = await remindedVisits(tx, patient.id, ['confirmed'], text.now);
	const messages = [
		confirmed
			? aboutVisit(patient, text, 'visit-confirmed', confirmed)
			: answerTo(text, { patientId: patient.id }, 'no-visit-open', senderFields(), patient)
	];
	return { understoodAs: 'yes', handled: true, visitId: confirmed?.id, change: { messages } };
}

/**
 * NO cancels the visit that the newest text told of. Without one, or where several were told at once, somebody has to
 * ask what was meant: the wrong visit cancelled is a patient who comes for nothing, or does not come.
 */
async function onNo(tx: Tx, patient: PatientRow, text: ReceivedText): Promise<Understood> {
	const [visit, ...others] = await remindedVisits(tx, patient.id, ['planned', 'confirmed'], text.now);
	if (visit && others.length === 0) {
		return moved(tx, patient, text, visit, 'cancel');
	}
	const template = visit ? 'person-reads' : 'no-visit-open';
	const answer = answerTo(text, { patientId: patient.id }, template, senderFields(), patient);
	return { understoodAs: 'no', handled: false, change: { messages: [answer] } };
}

async function moved(
	tx: Tx,
	patient: PatientRow,
	text: ReceivedText,
	visit: VisitRow,
	move: 'confirm' | 'cancel'
): Promise<Understood> {
	const { audit, entries, events, messages = [] } = await moveVisit(tx, visit, move, 'patient', text.now);
	const template = move === 'confirm' ? 'visit-confirmed' : 'visit-declined';
	return {
		understoodAs: move === 'confirm' ? 'yes' : 'no',
		handled: true,
		visitId: visit.id,
		change: { audit, entries, events, messages: [aboutVisit(patient, text, template, visit), ...messages] }
	};
}

function aboutVisit(
	patient: PatientRow,
	text: ReceivedText,
	template: 'visit-confirmed' | 'visit-declined',
	{ startsAt, zone, place }: VisitRow
) {
	const fields = { ...senderFields(), startsAt, zone, place };
	return answerTo(text, { patientId: patient.id }, template, fields, patient);
}

/**
 * Visits ahead whose time a text has told, or may have: the one of the newest text first, because that is what an
 * answer is to, then those that were told at once with it.
 */
async function remindedVisits(
	reader: Reader,
	patientId: string,
	states: VisitState[],
	now: number
): Promise<VisitRow[]> {
	const mayHaveArrived = or(isNotNull(outbox.sentAt), gt(outbox.attempts, 0), eq(outbox.state, 'sending'));
	// A yes to the old time of a visit is none to the new one, which the news or a reminder of its own has told.
	const tellsHowItIs = or(
		eq(reminders.sequence, visits.sequence),
		eq(outbox.causeKey, sql`'visit-news:' || ${visits.id} || ':' || ${visits.sequence} || ':sms'`)
	);
	const toldAt = sql<number>`max(coalesce(${outbox.sentAt}, ${outbox.nextAt}))`;
	const rows = await reader
		.select({ visit: visits, toldAt })
		.from(visits)
		.innerJoin(episodes, eq(episodes.id, visits.episodeId))
		.innerJoin(outbox, and(eq(outbox.refKind, 'visit'), eq(outbox.refId, visits.id)))
		.leftJoin(reminders, eq(reminders.messageId, outbox.id))
		.where(
			and(
				eq(episodes.patientId, patientId),
				inArray(visits.state, states),
				gt(visits.startsAt, now),
				tellsHowItIs,
				mayHaveArrived
			)
		)
		.groupBy(visits.id)
		.orderBy(desc(toldAt), asc(visits.startsAt), asc(visits.id));
	const newest = rows[0]?.toldAt ?? 0;
	return rows.filter((row) => newest - row.toldAt <= AT_ONCE_MS).map(({ visit }) => visit);
}

/** From now on these patients get no texts. A second STOP does not move the date of the first. */
export async function optOut(tx: Tx, patientIds: string[], now: number): Promise<void> {
	await tx
		.update(patients)
		.set({ smsOptedOutAt: sql`coalesce(${patients.smsOptedOutAt}, ${now})` })
		.where(inArray(patients.id, patientIds));
}
