import { and, eq, isNull } from 'drizzle-orm';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { Refusals } from '$lib/domain/core/refusals';
import { localDateOf } from '$lib/domain/core/time';
import type { AdmitInput } from '$lib/domain/episodes/forms';
import type { Contact } from '$lib/domain/episodes/operation';
import { isSameName, normaliseName, written } from '$lib/domain/episodes/identifiers';
import { conflictsWith, type PatientField } from '$lib/domain/episodes/identity';
import { normalisePhone, PhoneError } from '$lib/domain/messages/phone';
import { accessEpisode } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { episodes, patients, units } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { write, type Written } from '../write';
import { amendPatient } from './amend-patient';
import { isNumber } from './spelt';

type PatientRow = typeof patients.$inferSelect;
type Given = AdmitInput['patient'];

/** Who is meant by an admission: the record that is known, if there is one, and what was given. */
export interface Identified {
	mrn: string;
	known: PatientRow | null;
	given: Given;
	/** E.164; null where none was given. */
	phone: string | null;
}

/**
 * Find the patient with that hospital number, without changing anything.
 * @param confirmName whether a person says that the name which differs is the name now
 * @throws Problem `invalid` naming each field that contradicts the record, with `confirm: 'confirmName'` when it is
 * the name alone, or a telephone number that is none; `already-admitted` when the patient has an open episode
 */
export async function identifyPatient(
	tx: Tx,
	context: PersonContext,
	given: Given,
	confirmName: boolean
): Promise<Identified> {
	const mrn = written(given.mrn);
	const [known = null] = await tx.select().from(patients).where(isNumber(patients.mrn, mrn));
	const refusals = new Refusals();
	const phone = await refusals.of(() => phoneOf(given.phone));
	await refusals.of(() =>
		known ? refuseConflicts(known, given, confirmName) : refuseBirthDate(given.birthDate, context.now)
	);
	refusals.throwIfAny();
	if (known) {
		await refuseOpenStay(tx, context, known);
	}
	return { mrn, known, given, phone };
}

/** Bring the record up to date, or begin it. */
export async function settlePatient(
	tx: Tx,
	context: PersonContext,
	who: Identified
): Promise<{ patientId: string; audit: AuditEvent[] }> {
	const { known } = who;
	return known
		? { patientId: known.id, audit: await amend(tx, context, known, who) }
		: { patientId: await insertPatient(tx, context, who), audit: [] };
}

/**
 * Put right how a patient is reached. An empty number takes it away; what is left out stays as it is.
 * @throws Problem `invalid` for a telephone number that is none; `wrong-state` when the record says it already
 */
export function amendContact(
	context: PersonContext,
	episodeId: string,
	input: Contact
): Promise<Written<{ id: string }>> {
	return write(context, 'contact.amend', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'contact.amend');
		const [known] = await tx.select().from(patients).where(eq(patients.id, episode.patientId));
		if (!known) {
			throw new Error(`Episode ${episodeId} lost its patient.`);
		}
		const [amended] = await amendPatient(tx, context, known, contactOf(input));
		if (!amended) {
			throw new Problem('wrong-state', 'The record says this already; nothing was changed.');
		}
		return {
			result: { id: known.id },
			audit: { ...amended, episodeId },
			events: [{ topic: 'episode', kind: 'contact', id: episodeId, episodeId }]
		};
	});
}

/** What was given; what was left out is no part of it. */
function contactOf({ phone, ...rest }: Contact): Partial<Pick<PatientRow, PatientField>> {
	const given = Object.fromEntries(Object.entries(rest).filter(([, value]) => value !== undefined));
	return { ...given, ...(phone === undefined ? {} : { phone: phoneOf(phone ?? undefined, '/phone') }) };
}

function refuseConflicts(known: PatientRow, given: Given, confirmName: boolean): void {
	const { errors, confirmable } = conflictsWith(known.mrn, known, given);
	if (errors.length === 0 || (confirmable && confirmName)) {
		return;
	}
	const detail = errors.map(({ message }) => message).join(' ');
	throw new Problem('invalid', detail, { errors, ...(confirmable ? { confirm: 'confirmName' } : {}) });
}

/** Nobody lies in two beds: say where the patient is, so that the other stay is moved or closed. */
async function refuseOpenStay(tx: Tx, { actor }: PersonContext, { id, name }: PatientRow): Promise<void> {
	const [open] = await tx
		.select({ episodeId: episodes.id, unitId: units.id, unit: units.name, bed: episodes.bed })
		.from(episodes)
		.innerJoin(units, eq(units.id, episodes.unitId))
		.where(and(eq(episodes.patientId, id), isNull(episodes.closedAt)));
	if (!open) {
		return;
	}
	const { episodeId, unitId, unit, bed } = open;
	const where = bed === null ? unit : `${unit}, bed ${bed}`;
	throw new Problem('already-admitted', `${name} is here already: ${where}. Move or close that episode.`, {
		unit,
		bed,
		// The way into the record is for those whose unit it is.
		...(actor.unitIds.includes(unitId) ? { episodeId } : {})
	});
}

function refuseBirthDate(birthDate: string, now: number): void {
	if (birthDate > localDateOf(now, env().hospital.zone) || birthDate < '1900-01-01') {
		throw invalidField('/patient/birthDate', `The birth date ${birthDate} is not between 1900 and today.`);
	}
}

async function insertPatient(tx: Tx, context: PersonContext, who: Identified): Promise<string> {
	const { mrn, given, phone } = who;
	const id = newId();
	await tx.insert(patients).values({
		id,
		name: normaliseName(given.name),
		mrn,
		birthDate: given.birthDate,
		sex: given.sex,
		phone,
		language: given.language ?? 'en',
		zone: given.zone ?? env().hospital.zone,
		smsConsent: given.smsConsent ?? false,
		email: given.email ?? null,
		mailConsent: given.mailConsent ?? false,
		createdAt: context.now
	});
	return id;
}

/** Store what was given anew and keep what stood there before. What was left out stays as it is. */
async function amend(
	tx: Tx,
	context: PersonContext,
	known: PatientRow,
	{ given, phone }: Identified
): Promise<AuditEvent[]> {
	const after: Partial<Pick<PatientRow, PatientField>> = {
		name: isSameName(known.name, given.name) ? known.name : normaliseName(given.name),
		sex: given.sex === 'unknown' ? known.sex : given.sex,
		phone: phone ?? known.phone,
		language: given.language ?? known.language,
		smsConsent: given.smsConsent ?? known.smsConsent,
		email: given.email ?? known.email,
		mailConsent: given.mailConsent ?? known.mailConsent,
		zone: given.zone ?? known.zone
	};
	return amendPatient(tx, context, known, after);
}

function phoneOf(typed: string | undefined, pointer = '/patient/phone'): string | null {
	if (!typed) {
		return null;
	}
	try {
		return normalisePhone(typed);
	} catch (error) {
		if (error instanceof PhoneError) {
			throw invalidField(pointer, error.message);
		}
		throw error;
	}
}
