import type { Person } from '$lib/domain/access/actor';
import { ROLES, type Role } from '$lib/domain/core/codes';
import type { PersonContext } from '$lib/server/context';
import { db } from '$lib/server/db';
import {
	episodes,
	operations,
	patients,
	placements,
	referrals,
	threads,
	units,
	users,
	userUnits
} from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';

/** A Tuesday, 09:00 in Dublin, without daylight saving: 3 March 2026. */
export const HOSPITAL_NOW = Date.parse('2026-03-03T09:00:00Z');
export const ZONE = 'Europe/Dublin';

const DAY = 24 * 60 * 60 * 1000;

export interface Hospital {
	/** What all instants of the fixture count from. */
	now: number;
	units: { icu: string; ward: string; gym: string };
	/** One of each role, in all three units, each with a telephone. */
	people: Record<Role, Person>;
	/** A second nurse of the same units. */
	nurse2: Person;
	/** A surgeon of a unit that has no patients of ours. */
	outsider: Person;
	patient: { id: string; name: string; phone: string };
	/** The patient's stay on the ward, bed 4, two days after the operation. */
	episodeId: string;
}

/** Rows for a small hospital, inserted directly: no audit, no events, no messages. Call it once for a database. */
export async function makeHospital(now = HOSPITAL_NOW): Promise<Hospital> {
	const ids = { icu: newId(), ward: newId(), gym: newId() };
	const far = newId();
	await db()
		.insert(units)
		.values([
			{ id: ids.icu, name: 'Heron Unit', kind: 'intensive-care', zone: ZONE },
			{ id: ids.ward, name: 'Tern Ward', kind: 'ward', zone: ZONE },
			{ id: ids.gym, name: 'East Gym', kind: 'gym', zone: ZONE },
			{ id: far, name: 'Curlew Ward', kind: 'ward', zone: ZONE }
		]);
	const all = Object.values(ids);
	const people = {} as Record<Role, Person>;
	for (const role of ROLES) {
		people[role] = await addPerson({ role, unitIds: all, now });
	}
	const nurse2 = await addPerson({ role: 'nurse', unitIds: all, now });
	const outsider = await addPerson({ role: 'surgeon', unitIds: [far], now });
	const { patient, episodeId } = await addPatient({
		unitId: ids.ward,
		bed: '4',
		surgeonId: people.surgeon.id,
		now
	});
	return { now, units: ids, people, nurse2, outsider, patient, episodeId };
}

let count = 0;

/** A number that nobody has: +353 86 and seven digits, growing. */
export function newPhone(): string {
	count += 1;
	return `+35386${String(5_550_000 + count)}`;
}

export interface NewPerson {
	role: Role;
	unitIds: string[];
	now?: number;
	name?: string;
	email?: string;
	/** A new number where left out; null for somebody without one. */
	phone?: string | null;
	disabledAt?: number;
}

export async function addPerson(given: NewPerson): Promise<Person> {
	const { role, unitIds, now = HOSPITAL_NOW } = given;
	const id = newId();
	const phone = given.phone === undefined ? newPhone() : given.phone;
	const name = given.name ?? `Robin ${role} ${count}`;
	await db()
		.insert(users)
		.values({
			id,
			email: given.email ?? `${role}.${id}@saltmarsh.example`,
			name,
			role,
			passwordHash: null,
			phone,
			createdAt: now - 90 * DAY,
			disabledAt: given.disabledAt ?? null
		});
	if (unitIds.length > 0) {
		await db()
			.insert(userUnits)
			.values(unitIds.map((unitId) => ({ userId: id, unitId })));
	}
	return { kind: 'person', id, name, role, unitIds };
}

/** Another ward in which everybody of the hospital works too, with one patient: what is agreed for it is nobody else's. */
export async function addWard(hospital: Hospital): Promise<{ unitId: string; episodeId: string }> {
	const unitId = newId();
	await db()
		.insert(units)
		.values({ id: unitId, name: `Ward ${unitId}`, kind: 'ward', zone: ZONE });
	for (const person of Object.values(hospital.people)) {
		person.unitIds = [...person.unitIds, unitId];
	}
	const { episodeId } = await addPatient({ unitId, bed: '1' });
	return { unitId, episodeId };
}

export interface NewPatient {
	unitId: string;
	bed?: string | null;
	surgeonId?: string | null;
	now?: number;
	name?: string;
	/** A new number where left out; null for somebody without one. */
	phone?: string | null;
	zone?: string;
	smsConsent?: boolean;
	smsOptedOutAt?: number | null;
	/** Nobody has one where left out; whoever has one consents to mails. */
	email?: string;
	language?: string;
	/** Two days before `now` where left out. */
	operatedAt?: number;
}

/** A patient with one episode, one operation by sternotomy and one placement. Consents to texts unless told otherwise. */
export async function addPatient(
	given: NewPatient
): Promise<{ patient: { id: string; name: string; phone: string }; episodeId: string; operationId: string }> {
	const { unitId, bed = null, surgeonId = null, now = HOSPITAL_NOW } = given;
	const [id, episodeId, operationId] = [newId(), newId(), newId()];
	const phone = given.phone === undefined ? newPhone() : given.phone;
	const operatedAt = given.operatedAt ?? now - 2 * DAY;
	const name = given.name ?? 'Ide Quillfeather';
	await db()
		.insert(patients)
		.values({
			id,
			name,
			mrn: `T-${id.slice(-12)}`.toUpperCase(),
			birthDate: '1958-09-05',
			sex: 'female',
			phone,
			language: given.language ?? 'en',
			zone: given.zone ?? ZONE,
			smsConsent: given.smsConsent ?? true,
			smsOptedOutAt: given.smsOptedOutAt ?? null,
			email: given.email ?? null,
			mailConsent: given.email !== undefined,
			createdAt: operatedAt
		});
	await db().insert(episodes).values({
		id: episodeId,
		patientId: id,
		unitId,
		bed,
		phase: 'inpatient',
		level: 2,
		betaBlocked: true,
		rhythm: 'sinus',
		surgeonId,
		createdAt: operatedAt,
		closedAt: null
	});
	await db().insert(operations).values({
		id: operationId,
		episodeId,
		procedure: 'Coronary artery bypass',
		approach: 'sternotomy',
		operatedAt,
		surgeonId,
		createdAt: operatedAt
	});
	await db()
		.insert(placements)
		.values({ id: newId(), episodeId, unitId, bed, fromAt: operatedAt, untilAt: null });
	return { patient: { id, name, phone: phone ?? '' }, episodeId, operationId };
}

/** A referral with its empty thread. */
export async function addReferral(given: {
	episodeId: string;
	askedBy: string;
	state?: (typeof referrals.$inferInsert)['state'];
	service?: (typeof referrals.$inferInsert)['service'];
	askedAt?: number;
}): Promise<{ referralId: string; threadId: string }> {
	const [referralId, threadId] = [newId(), newId()];
	await db()
		.insert(referrals)
		.values({
			id: referralId,
			episodeId: given.episodeId,
			service: given.service ?? 'physiotherapy',
			priority: 'routine',
			question: 'Please mobilise.',
			state: given.state ?? 'accepted',
			askedBy: given.askedBy,
			askedAt: given.askedAt ?? HOSPITAL_NOW - DAY
		});
	await db().insert(threads).values({ id: threadId, referralId, episodeId: given.episodeId, lastSeq: 0 });
	return { referralId, threadId };
}

/** A request of this person at this instant, without a key. */
export function contextOf(person: Person, now = HOSPITAL_NOW): PersonContext {
	return { actor: person, now, address: '127.0.0.1', key: null };
}
