import { eq, inArray, sql } from 'drizzle-orm';
import { gatewayStops, readPatientReply } from '$lib/domain/messages/reply';
import type { SmsFields, SmsTemplate } from '$lib/domain/messages/templates';
import type { Tx } from '../db';
import { patients } from '../db/schema';
import { moveVisit, type VisitRow } from '../visits/move';
import type { PatientRow } from './sender';
import { newestTextAsks, toldVisits } from './told-visits';
import { answerTo, senderFields, stopHeardKey, type ReceivedText, type Understood } from './understood';

/** One automatic 'a person reads this' in so many hours: a telephone that answers by itself must not talk with us. */
const PERSON_READS_EVERY_MS = 12 * 60 * 60 * 1000;

/** Texts of one evening: which of them a NO answers, nobody can tell. */
const TOLD_TOGETHER_MS = 60 * 60 * 1000;

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
		case 'acknowledged':
			// 'Ok' to 'your visit is cancelled' must not confirm another one.
			return (await newestTextAsks(tx, patient.id))
				? onYes(tx, patient, text)
				: { understoodAs, handled: true };
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
	const told = await toldVisits(tx, patient.id, text.now);
	const open = told.find(({ visit }) => visit.state === 'planned');
	if (open) {
		return moved(tx, patient, text, open.visit, 'confirm');
	}
	const confirmed = told[0]?.visit;
	const messages = [
		confirmed
			? aboutVisit(patient, text, 'visit-confirmed', confirmed)
			: answerTo(text, { patientId: patient.id }, 'no-visit-open', senderFields(), patient)
	];
	return { understoodAs: 'yes', handled: true, visitId: confirmed?.id, change: { messages } };
}

/**
 * NO cancels the visit that the newest text told of. Without one, or where several were told at once, somebody has to
 * ask what was meant: the wrong visit must not be cancelled.
 */
async function onNo(tx: Tx, patient: PatientRow, text: ReceivedText): Promise<Understood> {
	const [newest, ...others] = await toldVisits(tx, patient.id, text.now);
	if (newest && others.some(({ toldAt }) => newest.toldAt - toldAt <= TOLD_TOGETHER_MS)) {
		const which = answerTo(text, { patientId: patient.id }, 'person-reads', senderFields(), patient);
		return { understoodAs: 'no', handled: false, change: { messages: [which] } };
	}
	if (newest) {
		return moved(tx, patient, text, newest.visit, 'cancel');
	}
	const answer = answerTo(text, { patientId: patient.id }, 'no-visit-open', senderFields(), patient);
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

/** From now on these patients get no texts. A second STOP does not move the date of the first. */
export async function optOut(tx: Tx, patientIds: string[], now: number): Promise<void> {
	await tx
		.update(patients)
		.set({ smsOptedOutAt: sql`coalesce(${patients.smsOptedOutAt}, ${now})` })
		.where(inArray(patients.id, patientIds));
}
