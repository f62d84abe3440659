import type { Person } from '$lib/domain/access/actor';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { hashPassword } from '../../auth/passwords';
import { systemContext } from '../../context';
import type { Tx } from '../../db';
import { units, users, userUnits } from '../../db/schema';
import { env } from '../../env';
import { newId } from '../../ids';
import { write } from '../../write';
import { markLoading } from '../mark';
import type { Calendar } from './calendar';
import { fillCover } from './cover';
import {
	DEMO_PASSWORD,
	emailOf,
	PEOPLE,
	UNITS,
	type DemoPerson,
	type PersonKey,
	type UnitName
} from './people';

/** The hospital before its first patient: identifiers and people by the names that the stories use. */
export interface Found {
	units: Record<UnitName, string>;
	people: Record<PersonKey, Person>;
}

const PERSON_KEYS = Object.keys(PEOPLE) as PersonKey[];

/** Found the hospital: units, staff with their sign-ins, and the roster, in one transaction that also marks it. */
export async function foundHospital(calendar: Calendar, foundedAt: number): Promise<Found> {
	// Hashing takes long and must not hold the write lock.
	const hashes = await Promise.all(PERSON_KEYS.map(() => hashPassword(DEMO_PASSWORD)));
	const found = newHospital();
	await write(systemContext('demonstration', foundedAt), 'anyone', async (tx) => {
		await markLoading(tx, foundedAt);
		await insertUnits(tx, found);
		await insertPeople(tx, found, hashes, foundedAt);
		await fillCover(tx, found, calendar);
		return { result: null, audit: founded(found) };
	});
	return found;
}

function newHospital(): Found {
	const unitIds = UNITS.map(({ name }) => [name, newId()] as const);
	const all = unitIds.map(([, id]) => id);
	const people = PERSON_KEYS.map((key) => {
		const { name, role, senior = false }: DemoPerson = PEOPLE[key];
		return [key, { kind: 'person', id: newId(), name, role, senior, unitIds: all }] as const;
	});
	return {
		units: Object.fromEntries(unitIds) as Found['units'],
		people: Object.fromEntries(people) as unknown as Found['people']
	};
}

async function insertUnits(tx: Tx, found: Found): Promise<void> {
	const { zone } = env().hospital;
	await tx.insert(units).values(UNITS.map(({ name, kind }) => ({ id: found.units[name], name, kind, zone })));
}

async function insertPeople(tx: Tx, found: Found, hashes: string[], createdAt: number): Promise<void> {
	const rows = PERSON_KEYS.map((key, index) => {
		const { id, name, role, senior = false } = found.people[key];
		const { phone } = PEOPLE[key];
		const passwordHash = hashes[index] ?? null;
		return { id, name, role, email: emailOf(key), phone, senior, passwordHash, createdAt };
	});
	await tx.insert(users).values(rows);
	const memberships = rows.flatMap(({ id }) =>
		Object.values(found.units).map((unitId) => ({ userId: id, unitId }))
	);
	await tx.insert(userUnits).values(memberships);
}

function founded(found: Found): [AuditEvent, ...AuditEvent[]] {
	const unit = (objectId: string): AuditEvent => ({ action: 'unit.created', objectKind: 'unit', objectId });
	const account = ({ id, role }: Person): AuditEvent => ({
		action: 'account.created',
		objectKind: 'account',
		objectId: id,
		detail: { role }
	});
	const [heron, tern, gym] = UNITS.map(({ name }) => found.units[name]) as [string, string, string];
	return [unit(heron), unit(tern), unit(gym), ...Object.values(found.people).map(account)];
}
