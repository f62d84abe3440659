import { and, asc, eq } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { ROLES, CLOSE_REASONS } from '$lib/domain/core/codes';
import type { Person } from '$lib/domain/access/actor';
import { db } from '$lib/server/db';
import {
	audit,
	coverShifts,
	episodes,
	escalations,
	liveEvents,
	outbox,
	placements
} from '$lib/server/db/schema';
import { closeEpisode } from '$lib/server/episodes/close';
import { listEpisodes } from '$lib/server/episodes/list';
import { movePatient } from '$lib/server/episodes/move';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { newId } from '$lib/server/ids';
import { eventsAfter, liveCursor } from '$lib/server/live/log';
import { mayHear } from '$lib/server/live/stream';
import { addPatient, addPerson, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const HOUR = 3600 * 1000;
const CALL = {
	grade: 'high',
	situation: 'Pressure fell.',
	background: 'Bypass.',
	assessment: 'Fall of 20.',
	request: 'Please come.'
} as const;

const hospital = await openHospital();
let episodeId: string;
let bed: string;
let count = 0;
/** Each belongs to one unit alone. */
let onWard: Person;
let onIcu: Person;

beforeAll(async () => {
	const { ward, icu } = hospital.units;
	onWard = await addPerson({ role: 'nurse', unitIds: [ward] });
	onIcu = await addPerson({ role: 'nurse', unitIds: [icu] });
	await cover(ward, onWard);
	await cover(icu, onIcu);
});
beforeEach(async () => {
	bed = `B${(count += 1)}`;
	({ episodeId } = await addPatient({ unitId: hospital.units.ward, bed }));
});

async function cover(unitId: string, { id: userId }: Person) {
	const { now } = hospital;
	const shift = { id: newId(), unitId, userId, startsAt: now - HOUR, endsAt: now + HOUR };
	await db()
		.insert(coverShifts)
		.values({ ...shift, post: 'nurse' });
}

const as = (role: keyof Hospital['people'] = 'coordinator') => contextOf(hospital.people[role]);
const row = async () => (await db().select().from(episodes).where(eq(episodes.id, episodeId))).at(0);
const placed = () =>
	db()
		.select({ unitId: placements.unitId, bed: placements.bed, untilAt: placements.untilAt })
		.from(placements)
		.where(eq(placements.episodeId, episodeId))
		.orderBy(asc(placements.fromAt), asc(placements.id));

/** What each of the two nurses hears of the work, live and on resuming, as `topic kind`. */
async function heard(work: () => Promise<unknown>) {
	const cursor = await liveCursor();
	await work();
	const events = await eventsAfter(db(), cursor);
	const of = (person: Person) =>
		events.filter((event) => mayHear(person, event)).map(({ topic, kind }) => `${topic} ${kind}`);
	return { ward: of(onWard), icu: of(onIcu) };
}

describe('moving a patient', () => {
	it('changes the place, keeps where it was, and says so on record', async () => {
		const { result } = await movePatient(as(), episodeId, { unit: 'Heron Unit', bed: ` H${count} ` });
		expect(result).toEqual({
			id: episodeId,
			unit: 'Heron Unit',
			unitId: hospital.units.icu,
			bed: `H${count}`
		});
		expect(await row()).toMatchObject({ unitId: hospital.units.icu, bed: `H${count}`, phase: 'inpatient' });
		expect(await placed()).toEqual([
			{ unitId: hospital.units.ward, bed, untilAt: hospital.now },
			{ unitId: hospital.units.icu, bed: `H${count}`, untilAt: null }
		]);
		const [entry] = await db().select().from(audit).where(eq(audit.objectId, episodeId));
		expect(entry).toMatchObject({
			action: 'episode.moved',
			detail: { fromUnit: hospital.units.ward, fromBed: bed, toUnit: hospital.units.icu, toBed: `H${count}` }
		});
	});

	it('is heard in the unit that the patient left and in the new one', async () => {
		const move = () => movePatient(as(), episodeId, { unit: 'Heron Unit', bed: `H${count}` });
		expect(await heard(move)).toEqual({ ward: ['episode moved'], icu: ['episode moved'] });
	});

	it('within a unit is heard there alone, once', async () => {
		const move = () => movePatient(as(), episodeId, { unit: 'Tern Ward', bed: `N${count}` });
		expect(await heard(move)).toEqual({ ward: ['episode moved'], icu: [] });
	});

	it('does not tell the new unit what happened in the old one', async () => {
		const work = async () => {
			await raiseEscalation(as('therapist'), episodeId, CALL);
			await movePatient(as(), episodeId, { unit: 'Heron Unit', bed: `H${count}` });
		};
		const { ward, icu } = await heard(work);
		expect(ward).toContain('escalation raised');
		expect(icu).not.toContain('escalation raised');
		expect(icu).toContain('escalation moved');
	});

	it('to a unit where one does not belong is allowed, and the patient is out of sight then', async () => {
		await movePatient(contextOf(onWard), episodeId, { unit: hospital.units.icu, bed: `H${count}` });
		await expect(getNameboard(db(), onWard, episodeId, hospital.now)).rejects.toMatchObject({
			code: 'not-found'
		});
		expect((await getNameboard(db(), onIcu, episodeId, hospital.now)).bed).toBe(`H${count}`);
	});

	it('to a gym makes an outpatient without a bed, and back again', async () => {
		await movePatient(as(), episodeId, { unit: 'East Gym' });
		expect(await row()).toMatchObject({ unitId: hospital.units.gym, bed: null, phase: 'outpatient' });
		await movePatient(as(), episodeId, { unit: 'Tern Ward', bed });
		expect(await row()).toMatchObject({ bed, phase: 'inpatient' });
	});

	it.each([
		['a ward without a bed', { unit: 'Tern Ward' }, 'invalid'],
		['a unit that is none', { unit: 'Moon Ward', bed: 'M1' }, 'invalid'],
		['a bed in use, however it is written', { unit: 'Tern Ward', bed: ' 4 ' }, 'bed-in-use']
	])('is refused to %s', async (_, input, code) => {
		await expect(movePatient(as(), episodeId, input)).rejects.toMatchObject({ code });
		expect(await row()).toMatchObject({ unitId: hospital.units.ward, bed });
	});

	it('to where the patient is already is refused', async () => {
		const same = { unit: 'Tern Ward', bed: bed.toLowerCase() };
		await expect(movePatient(as(), episodeId, same)).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it.each(ROLES.filter((role) => role !== 'coordinator' && role !== 'nurse'))(
		'is not for a %s',
		async (role) => {
			await expect(
				movePatient(as(role), episodeId, { unit: 'Tern Ward', bed: `N${count}` })
			).rejects.toMatchObject({ code: 'not-allowed' });
		}
	);

	it('is not for another unit, which learns nothing', async () => {
		const move = movePatient(contextOf(onIcu), episodeId, { unit: 'Heron Unit', bed: `H${count}` });
		await expect(move).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('a call for help about a patient who is moved', () => {
	const textsTo = async ({ id }: Person, escalationId: string) =>
		db()
			.select({ body: outbox.body, state: outbox.state })
			.from(outbox)
			.where(and(eq(outbox.userId, id), eq(outbox.refId, escalationId)))
			.orderBy(asc(outbox.createdAt), asc(outbox.id));
	const raise = async () => (await raiseEscalation(as('therapist'), episodeId, CALL)).result.id;

	it('tells the new bed to those who were told the old one, and stops what names the old', async () => {
		const id = await raise();
		await movePatient(as(), episodeId, { unit: 'Tern Ward', bed: `N${count}` });
		expect(await textsTo(onWard, id)).toMatchObject([
			{ body: expect.stringContaining(`bed ${bed}`), state: 'cancelled' },
			{ body: expect.stringContaining(`bed N${count}`), state: 'ready' }
		]);
	});

	it('tells the new bed to who was told in person, before any chain', async () => {
		const { nurse, therapist } = hospital.people;
		const input = { ...CALL, toldInPerson: nurse.id };
		const { id } = (await raiseEscalation(contextOf(therapist), episodeId, input)).result;
		await movePatient(as(), episodeId, { unit: 'Tern Ward', bed: `N${count}` });
		expect(await textsTo(nurse, id)).toMatchObject([
			{ body: expect.stringContaining(`bed ${bed}`), state: 'cancelled' },
			{ body: expect.stringContaining(`bed N${count}`), state: 'ready' }
		]);
	});

	it('starts its chain again in another unit, and those told before hear the place', async () => {
		const id = await raise();
		const later = { ...as(), now: hospital.now + 60_000 };
		await movePatient(later, episodeId, { unit: 'Heron Unit', bed: `H${count}` });
		const [call] = await db().select().from(escalations).where(eq(escalations.id, id));
		expect(call).toMatchObject({ state: 'raised', chainStartedAt: later.now });
		for (const person of [onIcu, onWard]) {
			expect((await textsTo(person, id)).at(-1)?.body).toContain(`Heron Unit, bed H${count}`);
		}
	});

	it('stays with who has it, and nobody is called a second time', async () => {
		const id = await raise();
		await takeEscalation(contextOf(onWard), id, null);
		const before = await db().$count(outbox);
		await movePatient(as(), episodeId, { unit: 'Tern Ward', bed: `N${count}` });
		expect(await db().$count(outbox)).toBe(before);
		const [call] = await db().select().from(escalations).where(eq(escalations.id, id));
		expect(call).toMatchObject({ state: 'taken', takenBy: onWard.id });
		const events = await db()
			.select({ kind: liveEvents.kind })
			.from(liveEvents)
			.where(eq(liveEvents.subjectId, id));
		expect(events.at(-1)?.kind).toBe('moved');
	});
});

describe('closing a stay', () => {
	const listed = async () => {
		const all = await listEpisodes(db(), hospital.people.nurse, hospital.now, null, {
			limit: 200,
			after: null
		});
		return all.items.some(({ id }) => id === episodeId);
	};

	it.each(CLOSE_REASONS)('for %s frees the bed and stays readable', async (reason) => {
		const { result } = await closeEpisode(as('physician'), episodeId, reason);
		expect(result.id).toBe(episodeId);
		expect(await row()).toMatchObject({ closedAt: hospital.now, closedFor: reason, bed });
		expect((await placed()).at(-1)).toMatchObject({ bed, untilAt: hospital.now });
		expect(await listed()).toBe(false);
		expect((await getNameboard(db(), hospital.people.nurse, episodeId, hospital.now)).id).toBe(episodeId);
		const next = await addPatient({ unitId: hospital.units.icu });
		await movePatient(as(), next.episodeId, { unit: 'Tern Ward', bed });
	});

	it('happens once, and a closed stay is not moved', async () => {
		await closeEpisode(as(), episodeId, 'home');
		await expect(closeEpisode(as(), episodeId, 'home')).rejects.toMatchObject({
			code: 'wrong-state',
			extra: { state: 'closed' }
		});
		const move = movePatient(as(), episodeId, { unit: 'Tern Ward', bed: `N${count}` });
		await expect(move).rejects.toMatchObject({ code: 'wrong-state' });
	});

	it('waits until nobody is called to that bed', async () => {
		const { result } = await raiseEscalation(as('therapist'), episodeId, CALL);
		for (const state of ['raised', 'taken']) {
			await expect(closeEpisode(as(), episodeId, 'died')).rejects.toMatchObject({
				code: 'wrong-state',
				extra: { state, escalationId: result.id }
			});
			if (state === 'raised') {
				await takeEscalation(contextOf(onWard), result.id, null);
			}
		}
		expect((await row())?.closedAt).toBeNull();
	});

	it('is heard in its unit alone', async () => {
		const work = () => closeEpisode(as(), episodeId, 'home');
		expect(await heard(work)).toEqual({ ward: ['episode closed'], icu: [] });
	});

	it.each(ROLES.filter((role) => !['coordinator', 'nurse', 'physician'].includes(role)))(
		'is not for a %s',
		async (role) => {
			await expect(closeEpisode(as(role), episodeId, 'home')).rejects.toMatchObject({ code: 'not-allowed' });
		}
	);
});
