import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import { ROLES, type Role } from '$lib/domain/core/codes';
import { db } from '$lib/server/db';
import { episodes, inboundMessages, liveEvents, patients, units } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { settleInbound } from '$lib/server/messages/settle';
import { getInboundText } from '$lib/server/messages/to-see-to';
import { freshDatabase } from '../support/database';
import { testEnvironment } from '../support/environment';
import { callHook, signedPost } from '../support/hook-server';
import { HOSPITAL_NOW, addPatient, addPerson, contextOf, makeHospital, newPhone } from '../support/hospital';

/** Who may read a text that came in, and close it: by identifier, in the list, and by what the stream tells. */

const PUBLIC_URL = 'https://ropewalk.saltmarsh.example';

let cleanUp: () => void;
/** Three units, and in each of the first two one person of each role that sees patients. */
let east: string;
let west: string;
let none: string;
let eastern: Record<Role, Person>;
let western: Record<Role, Person>;

beforeAll(async () => {
	const environment = testEnvironment({ PUBLIC_URL });
	const database = await freshDatabase();
	await makeHospital();
	cleanUp = () => {
		database.close();
		environment.remove();
	};
});
afterAll(() => cleanUp());

beforeEach(async () => {
	[east, west, none] = [newId(), newId(), newId()];
	for (const id of [east, west, none]) {
		await db()
			.insert(units)
			.values({ id, name: `Ward ${id.slice(-6)}`, kind: 'ward', zone: 'Europe/Dublin' });
	}
	eastern = await everybodyOf(east);
	western = await everybodyOf(west);
});

async function everybodyOf(unitId: string): Promise<Record<Role, Person>> {
	const people = {} as Record<Role, Person>;
	for (const role of ROLES) {
		people[role] = await addPerson({ role, unitIds: [unitId] });
	}
	return people;
}

/** A text from a number, through the webhook. Answers its identifier. */
async function textFrom(phone: string, body = 'I feel dizzy.'): Promise<string> {
	const MessageSid = `SM${newId().replaceAll('-', '')}`;
	const fields = { From: phone, To: '+353860000000', Body: body, MessageSid };
	const answer = await callHook(signedPost(PUBLIC_URL, '/api/hooks/sms', fields), HOSPITAL_NOW);
	expect(answer.status).toBe(200);
	const [row] = await db().select().from(inboundMessages).where(eq(inboundMessages.providerId, MessageSid));
	return row?.id ?? '';
}

type Seen = 'reads' | 'not-found' | 'not-allowed';

/** Reading and the list must agree, and what may not be read may not be closed. */
async function sees(person: Person, id: string): Promise<Seen> {
	const { mine } = await looseEndsOf(db(), person, HOSPITAL_NOW);
	const listed = mine.some((end) => end.id === id);
	try {
		await getInboundText(person, id);
	} catch (error) {
		expect(listed).toBe(false);
		const code = (error as { code: Seen }).code;
		await expect(settleInbound(contextOf(person), id, { note: 'Called.' })).rejects.toMatchObject({ code });
		return code;
	}
	expect(listed).toBe(person.role === 'coordinator');
	return 'reads';
}

async function hearers(id: string): Promise<(string | null)[]> {
	const rows = await db()
		.select()
		.from(liveEvents)
		.where(and(eq(liveEvents.subjectId, id), eq(liveEvents.kind, 'received')));
	return rows.map(({ userId }) => userId);
}

const OTHERS = ['surgeon', 'physician', 'nurse', 'speech-therapist', 'admin'] as const;

describe('a text of a patient', () => {
	it('is for those who plan visits in the unit where the patient is now', async () => {
		const { patient, episodeId } = await addPatient({ unitId: east });
		const id = await textFrom(patient.phone);
		expect(await sees(eastern.coordinator, id)).toBe('reads');
		expect(await sees(eastern.therapist, id)).toBe('reads');
		expect(await sees(western.coordinator, id)).toBe('not-found');
		expect(await sees(western.therapist, id)).toBe('not-found');
		for (const role of OTHERS) {
			expect(await sees(eastern[role], id)).toBe('not-allowed');
		}
		await db().update(episodes).set({ unitId: west }).where(eq(episodes.id, episodeId));
		expect(await sees(eastern.coordinator, id)).toBe('not-found');
		expect(await sees(western.coordinator, id)).toBe('reads');
	});
});

describe('a text that is filed under no patient', () => {
	it('from a number of two patients is for coordinators of their units alone', async () => {
		const phone = newPhone();
		await addPatient({ unitId: east, phone });
		await addPatient({ unitId: none, phone });
		const id = await textFrom(phone);
		expect(await sees(eastern.coordinator, id)).toBe('reads');
		expect(await sees(western.coordinator, id)).toBe('not-found');
		expect(await sees(eastern.therapist, id)).toBe('not-found');
		for (const role of OTHERS) {
			expect(await sees(eastern[role], id)).toBe('not-allowed');
		}
		expect((await getInboundText(eastern.coordinator, id)).from.name).toBe('a number of several people');
		const heard = await hearers(id);
		expect(heard).toContain(eastern.coordinator.id);
		expect(heard).not.toContain(western.coordinator.id);
		expect(heard).not.toContain(null);
	});

	it('from a number that is shared no more is every coordinator’s', async () => {
		const phone = newPhone();
		await addPatient({ unitId: east, phone });
		await addPatient({ unitId: east, phone });
		const id = await textFrom(phone);
		await db().update(patients).set({ phone: newPhone() }).where(eq(patients.phone, phone));
		expect(await sees(western.coordinator, id)).toBe('reads');
	});

	it.each([
		['a number of nobody', () => Promise.resolve(newPhone())],
		[
			'a patient without an episode',
			async () => {
				const phone = newPhone();
				const id = newId();
				await db().insert(patients).values({
					id,
					name: 'Orla Reedmace',
					mrn: id,
					birthDate: '1950-01-01',
					sex: 'female',
					phone,
					language: 'en',
					zone: 'Europe/Dublin',
					smsConsent: true,
					createdAt: HOSPITAL_NOW
				});
				return phone;
			}
		]
	])('from %s is for coordinators, whatever their unit, and for nobody else', async (_, phoneOf) => {
		const id = await textFrom(await phoneOf());
		expect(await sees(eastern.coordinator, id)).toBe('reads');
		expect(await sees(western.coordinator, id)).toBe('reads');
		expect(await sees(eastern.therapist, id)).toBe('not-found');
		for (const role of OTHERS) {
			expect(await sees(eastern[role], id)).toBe('not-allowed');
		}
		const unplaced = await addPerson({ role: 'coordinator', unitIds: [] });
		expect(await sees(unplaced, id)).toBe('not-found');
		expect(await hearers(id)).not.toContain(unplaced.id);
	});

	it('STOP from staff is for coordinators of that person’s units', async () => {
		const phone = newPhone();
		await addPerson({ role: 'nurse', unitIds: [east], phone });
		const id = await textFrom(phone, 'STOP');
		expect(await sees(eastern.coordinator, id)).toBe('reads');
		expect(await sees(western.coordinator, id)).toBe('not-found');
	});
});
