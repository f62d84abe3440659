import { eq } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import { disableAccount, setUnits } from '$lib/server/accounts/manage';
import { db } from '$lib/server/db';
import { audit, coverShifts, entries } from '$lib/server/db/schema';
import { movePatient } from '$lib/server/episodes/move';
import { arriveAtEscalation } from '$lib/server/escalations/arrive';
import { confirmPass, passEscalation } from '$lib/server/escalations/pass';
import { getEscalation } from '$lib/server/escalations/queries';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { newId } from '$lib/server/ids';
import { at, CALL, coverWard, escalationRow, messagesOf } from '../support/escalations';
import { addPatient, addPerson, addReferral, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const YEAR = 365 * 24 * 3600;

const hospital = await openHospital();
let episodeId: string;
let onWard: Person;
let onIcu: Person;
let id: string;
let bed = 0;

beforeAll(async () => {
	await coverWard(hospital);
	const { icu } = hospital.units;
	onIcu = await addPerson({ role: 'nurse', unitIds: [icu] });
	const times = { startsAt: at(-YEAR), endsAt: at(YEAR) };
	await db()
		.insert(coverShifts)
		.values({ id: newId(), unitId: icu, post: 'nurse', userId: onIcu.id, ...times });
});
beforeEach(async () => {
	onWard = await addPerson({ role: 'nurse', unitIds: [hospital.units.ward] });
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	const { threadId } = await addReferral({ episodeId, askedBy: hospital.people.surgeon.id });
	const therapist = contextOf(hospital.people.therapist, at(0));
	({ id } = (await raiseEscalation(therapist, episodeId, { ...CALL, grade: 'medium', threadId })).result);
	await takeEscalation(as(onWard, 10), id, 5);
});

const as = (person: Person, seconds: number) => contextOf(person, at(seconds));
const admin = (seconds: number) => as(hospital.people.admin, seconds);
function moveTo(unit: string, seconds: number) {
	bed += 1;
	return movePatient(as(hospital.people.coordinator, seconds), episodeId, { unit, bed: `B${bed}` });
}
const toldAt = async (seconds: number) =>
	(await messagesOf(id)).filter((m) => m.createdAt === at(seconds)).map(({ userId }) => userId);

const WAYS: [string, (seconds: number) => Promise<unknown>][] = [
	['the patient is moved to a unit of others', (seconds) => moveTo('Heron Unit', seconds)],
	['their account is disabled', (seconds) => disableAccount(admin(seconds), onWard.id)],
	['they leave the unit', (seconds) => setUnits(admin(seconds), onWard.id, [hospital.units.gym])]
];

describe('a holder who cannot see the call any more', () => {
	it.each(WAYS)('has others sought beside them at once when %s', async (_, deed) => {
		await deed(60);
		const row = await escalationRow(id);
		expect(row).toMatchObject({ state: 'taken', takenBy: onWard.id, chainStartedAt: at(60), nextStep: 1 });
		expect(row.nextStepAt).toBe(at(60 + 600));
		expect(row.askHolderAt).toBeNull();
		expect((await toldAt(60)).length).toBeGreaterThan(0);
		expect(await toldAt(60)).not.toContain(onWard.id);
		const { moves } = await getEscalation(db(), hospital.people.nurse, id);
		expect(moves.at(-1)).toMatchObject({ kind: 'out-of-reach', other: onWard.name });
		const onRecord = await db().select().from(audit).where(eq(audit.objectId, id));
		expect(onRecord.map(({ action }) => action)).toContain('escalation.out-of-reach');
		const [line] = await db()
			.select()
			.from(entries)
			.where(eq(entries.threadId, row.threadId ?? ''))
			.then((lines) => lines.slice(-1));
		expect(line).toMatchObject({ kind: 'event', strand: 'nursing' });
		expect(line?.body).toContain(onWard.name);
	});

	it.each(WAYS)('leaves it to whoever takes it after %s', async (_, deed) => {
		await deed(60);
		const { nurse } = hospital.people;
		await takeEscalation(as(nurse, 70), id, null);
		expect(await escalationRow(id)).toMatchObject({ takenBy: nurse.id, nextStepAt: null });
	});

	it('is over when somebody of the new unit takes it', async () => {
		await moveTo('Heron Unit', 60);
		expect(await toldAt(60)).toEqual([onIcu.id]);
		await expect(arriveAtEscalation(as(onWard, 65), id)).rejects.toMatchObject({ code: 'not-found' });
		await takeEscalation(as(onIcu, 70), id, null);
		await arriveAtEscalation(as(onIcu, 90), id);
		expect(await escalationRow(id)).toMatchObject({ takenBy: onIcu.id, arrivedAt: at(90) });
	});

	it('counts as gone from the bedside when they were there', async () => {
		await arriveAtEscalation(as(onWard, 30), id);
		await moveTo('Heron Unit', 60);
		expect(await escalationRow(id)).toMatchObject({ arrivedAt: null, takenBy: onWard.id });
		expect((await escalationRow(id)).nextStepAt).not.toBeNull();
	});

	it('may take it anew when the unit is theirs again', async () => {
		await setUnits(admin(60), onWard.id, [hospital.units.gym]);
		await setUnits(admin(65), onWard.id, [hospital.units.ward]);
		await takeEscalation(as(onWard, 70), id, null);
		expect(await escalationRow(id)).toMatchObject({ takenBy: onWard.id, nextStepAt: null });
	});

	it('can have passed it on: the receiver hears the new place, and confirms', async () => {
		const { physician } = hospital.people;
		await passEscalation(as(onWard, 20), id, { to: physician.id, reason: 'Busy.' });
		await moveTo('Heron Unit', 60);
		expect(await toldAt(60)).toEqual([onIcu.id, physician.id]);
		await confirmPass(as(physician, 70), id);
		expect(await escalationRow(id)).toMatchObject({ takenBy: physician.id, nextStepAt: null });
	});
});

describe('a holder who can see the call still', () => {
	it.each<[string, (seconds: number) => Promise<unknown>]>([
		['the patient gets another bed', (seconds) => moveTo('Tern Ward', seconds)],
		[
			'another account is disabled',
			async (seconds) => {
				const other = await addPerson({ role: 'nurse', unitIds: [hospital.units.ward] });
				await disableAccount(admin(seconds), other.id);
			}
		],
		[
			'they get a unit beside their own',
			(seconds) => setUnits(admin(seconds), onWard.id, [hospital.units.ward, hospital.units.icu])
		]
	])('keeps it alone when %s', async (_, deed) => {
		const before = await escalationRow(id);
		await deed(60);
		expect(await escalationRow(id)).toEqual(before);
		expect(await toldAt(60)).toEqual([]);
	});

	it('keeps it in a unit where they belong too', async () => {
		await setUnits(admin(20), onWard.id, [hospital.units.ward, hospital.units.icu]);
		await moveTo('Heron Unit', 60);
		expect(await escalationRow(id)).toMatchObject({ takenBy: onWard.id, nextStepAt: null });
		expect(await toldAt(60)).toEqual([]);
	});
});
