/** What a yes or a no by text is to, and what follows from it. */
import { HOUR } from '$lib/domain/core/time';
import { isExpected } from '$lib/domain/visits/states';
import type { Tx } from '../db';
import { moveVisit, type VisitRow } from '../visits/move';
import type { PatientRow } from './sender';
import { newestTextAsks, textsOfVisits, toldVisits, type ToldVisit, type VisitText } from './told-visits';
import { answerTo, senderFields, type ReceivedText, type Understood } from './understood';

/** Texts of one evening: which of them an answer is to, nobody can tell. */
const TOLD_TOGETHER_MS = HOUR;

/**
 * YES confirms the visit that the newest text told of; of those told within the same hour the next that waits for it.
 * Said again it is thanked for again. A yes to a time that has moved meanwhile is none to any other visit.
 */
export async function onYes(tx: Tx, patient: PatientRow, text: ReceivedText): Promise<Understood> {
	const told = await toldNow(tx, patient, text);
	const open = told.find(waits);
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
 * 'Ok' says yes where the newest text asked something: to 'your visit is cancelled' it must not confirm another one.
 * Where nothing is left to confirm it is not answered, so that nobody is thanked for thanks.
 */
export async function onAcknowledged(tx: Tx, patient: PatientRow, text: ReceivedText): Promise<Understood> {
	const asked = await newestTextAsks(tx, patient.id);
	return asked && (await toldNow(tx, patient, text)).some(waits)
		? onYes(tx, patient, text)
		: { understoodAs: 'acknowledged', handled: true };
}

/**
 * NO cancels the visit that the newest text told of, if it still is as that text told. Somebody has to ask what was
 * meant where it is not, where several visits were told of at once, and where none was: the wrong one must not be
 * cancelled. A NO that was heard before is only said to have been heard.
 */
export async function onNo(tx: Tx, patient: PatientRow, text: ReceivedText): Promise<Understood> {
	const texts = await textsOfVisits(tx, patient.id);
	const [newest] = texts;
	if (!newest) {
		return leftToPerson(patient, text, 'no-visit-open');
	}
	if (texts.some(({ about, at }) => about !== newest.about && newest.at - at <= TOLD_TOGETHER_MS)) {
		return leftToPerson(patient, text, 'person-reads');
	}
	const { visit } = newest;
	if (visit && visit.patientCancelledAt !== null) {
		const messages = [aboutVisit(patient, text, 'visit-declined', visit)];
		return { understoodAs: 'no', handled: true, visitId: visit.id, change: { messages } };
	}
	const told = (await toldVisits(tx, patient.id, text.now)).find(isToldBy(newest));
	return told ? moved(tx, patient, text, told.visit, 'cancel') : leftToPerson(patient, text, 'person-reads');
}

/** The visits that an answer may be to: told of by the newest texts, and still as those told. */
async function toldNow(tx: Tx, patient: PatientRow, { now }: ReceivedText): Promise<ToldVisit[]> {
	const told = await toldVisits(tx, patient.id, now);
	const [newest] = await textsOfVisits(tx, patient.id);
	const hasMoved = newest?.visit && isExpected(newest.visit.state) && !told.some(isToldBy(newest));
	const [first] = told;
	return first && !hasMoved ? told.filter(({ toldAt }) => first.toldAt - toldAt <= TOLD_TOGETHER_MS) : [];
}

function isToldBy({ about, at }: VisitText) {
	return ({ visit, toldAt }: ToldVisit) => visit.id === about && toldAt === at;
}

function waits({ visit }: ToldVisit): boolean {
	return visit.state === 'planned';
}

function leftToPerson(
	patient: PatientRow,
	text: ReceivedText,
	template: 'no-visit-open' | 'person-reads'
): Understood {
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
