import { gatewayStops, mayMeanVisit, readPatientReply } from '$lib/domain/messages/reply';
import type { SmsFields, SmsTemplate } from '$lib/domain/messages/templates';
import type { Tx } from '../db';
import { consent, optOut } from './consent';
import type { PatientRow } from './sender';
import { toldVisits } from './told-visits';
import { answerTo, senderFields, stopHeardKey, type ReceivedText, type Understood } from './understood';
import { onAcknowledged, onNo, onYes } from './visit-answer';

/** One automatic 'a person reads this' in so many hours: a telephone that answers by itself must not talk with us. */
const PERSON_READS_EVERY_MS = 12 * 60 * 60 * 1000;

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
			return onAcknowledged(tx, patient, text);
		case 'no':
			return onNo(tx, patient, text);
		case 'stop':
			await optOut(tx, [patient.id], text.now);
			return {
				understoodAs,
				// 'Cancel' ends the texts, and may have been meant for the visit that they told of.
				handled: !(mayMeanVisit(text.body) && (await isVisitTold(tx, patient.id, text.now))),
				// Where the gateway has understood it too, it sends the last text itself and would refuse ours.
				...(gatewayStops(text.body) || patient.smsOptedOutAt !== null
					? {}
					: { change: answer('texts-stopped', senderFields(), stopHeardKey(patient.id, text.now)) })
			};
		case 'start':
			return {
				understoodAs,
				handled: true,
				change: {
					...answer('texts-started', senderFields()),
					audit: await consent(tx, patient, text.now)
				}
			};
		case 'help':
			return { understoodAs, handled: true, change: answer('texts-help', senderFields()) };
		case 'other': {
			const once = `person-reads:${patient.id}:${Math.floor(text.now / PERSON_READS_EVERY_MS)}`;
			return { understoodAs, handled: false, change: answer('person-reads', senderFields(), once) };
		}
	}
}

async function isVisitTold(tx: Tx, patientId: string, now: number): Promise<boolean> {
	return (await toldVisits(tx, patientId, now)).length > 0;
}
