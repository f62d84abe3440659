import { eq } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { sessionBody, type SessionBody } from '$lib/domain/bedside/forms';
import type { Person } from '$lib/domain/access/actor';
import { setSenior } from '$lib/server/accounts/manage';
import { loadPerson } from '$lib/server/auth/people';
import { recordSession } from '$lib/server/bedside/actions';
import { db } from '$lib/server/db';
import { audit, episodes } from '$lib/server/db/schema';
import { getNameboard } from '$lib/server/episodes/nameboard';
import { decideLevel } from '$lib/server/levels/actions';
import { getLevel } from '$lib/server/levels/queries';
import { refuseToSign, sign } from '$lib/server/levels/sign-off';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { addPatient, addPerson, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let junior: Person;
let senior: Person;
let episodeId: string;

beforeAll(async () => {
	const unitIds = Object.values(hospital.units);
	junior = await addPerson({ role: 'therapist', unitIds });
	senior = { ...(await addPerson({ role: 'therapist', unitIds })), senior: true };
});
beforeEach(async () => {
	// Level 2, two days after a sternotomy.
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const at = (person: Person, minutes = 0) => contextOf(person, hospital.now + minutes * 60_000);
const levelNow = () => getLevel(db(), hospital.people.nurse, episodeId);
const endsOf = async (person: Person, side: 'mine' | 'theirs') =>
	(await looseEndsOf(db(), person, hospital.now + 3_600_000))[side].filter(
		(end) => end.episodeId === episodeId && end.kind === 'sign-off'
	);

const CALM = { hr: 78, sbp: 120, dbp: 72, spo2: 97, rr: 16, pain: 1 };
type Changes = Partial<Pick<SessionBody, 'activities' | 'symptoms'>> & { rise?: number };

/** A session at level 2 in which nothing is found; a systolic rise of 10 speaks for going on. */
function record(person: Person, { activities = [], symptoms = [], rise = 12 }: Changes = {}) {
	const body = sessionBody.parse({
		context: { betaBlocked: false, rhythm: 'sinus', sternotomy: true, level: 2, conscious: true },
		before: CALM,
		during: [{ ...CALM, sbp: 120 + rise, hr: 86, rpe: 11, work: 1 }],
		after: { ...CALM, sbp: 122 },
		symptoms,
		activities,
		level: 2,
		startedAt: new Date(hospital.now + 60_000).toISOString(),
		endedAt: new Date(hospital.now + 600_000).toISOString()
	});
	return recordSession(at(person, 12), episodeId, body);
}

describe('a decision on the level', () => {
	it('on advice holds at once, for a junior too, and keeps what it rested on', async () => {
		await record(junior);
		const { result } = await decideLevel(at(junior, 20), episodeId, { to: 3 });
		expect(result).toMatchObject({ state: 'made', level: 3 });
		const { today, reached, decisions } = await levelNow();
		expect([today, reached]).toEqual([3, 3]);
		expect(decisions).toMatchObject([
			{ from: 2, to: 3, suggestion: 'progress', decidedBy: junior.name, signedBy: null }
		]);
	});

	it.each([
		['chest pain in that session', { symptoms: ['angina'] }, 'Before daily walking: there was chest pain'],
		['nothing of the kind', {}, 'Before daily walking, ask: any chest pain']
	] as const)('is advised with what the record says of the hours before: %s', async (_, changes, words) => {
		await db().update(episodes).set({ level: 1, levelReached: 1 }).where(eq(episodes.id, episodeId));
		await record(junior, { ...changes, symptoms: 'symptoms' in changes ? [...changes.symptoms] : [] });
		await db().update(episodes).set({ level: 1 }).where(eq(episodes.id, episodeId));
		const { advice } = await levelNow();
		expect(advice?.reasons.map((reason) => reason.words).join('\n')).toContain(words);
	});

	it('lowers today’s level, and what was reached stays', async () => {
		await record(junior);
		await decideLevel(at(junior, 20), episodeId, { to: 3 });
		await decideLevel(at(junior, 30), episodeId, { to: 1, reason: 'Dizzy on the edge of the bed.' });
		const board = await getNameboard(db(), hospital.people.nurse, episodeId, hospital.now);
		expect([board.level, board.levelReached]).toEqual([1, 3]);
		const rows = await db().select().from(audit).where(eq(audit.episodeId, episodeId));
		expect(JSON.stringify(rows)).not.toContain('Dizzy');
		expect(rows.filter(({ action }) => action === 'level.decided')).toHaveLength(2);
	});

	it.each([
		['without a session', 3, {}],
		['two levels at once', 4, { rise: 12 }],
		['against a caution', 3, { symptoms: ['nausea'] as const }],
		['after a stop', 3, { symptoms: ['angina'] as const }]
	])('up %s is a junior’s proposal that a senior signs', async (what, to, changes) => {
		if (what !== 'without a session') {
			await record(senior, { ...changes, symptoms: [...('symptoms' in changes ? changes.symptoms : [])] });
		}
		const level = to as 3 | 4;
		await expect(decideLevel(at(junior, 20), episodeId, { to: level })).rejects.toMatchObject({
			extra: { errors: [{ pointer: '/reason' }] }
		});
		const reason = 'Walks the room with ease.';
		const { result } = await decideLevel(at(junior, 20), episodeId, { to: level, reason });
		expect(result).toMatchObject({ state: 'asked', level: 2 });
		expect((await levelNow()).today).toBe(2);
		expect(await endsOf(senior, 'mine')).toMatchObject([{ id: result.id, askedBy: junior.name }]);
		expect(await endsOf(junior, 'theirs')).toHaveLength(1);
		await sign(at(senior, 40), result.id);
		const { today, decisions, signOffs } = await levelNow();
		expect([today, signOffs]).toEqual([to, []]);
		expect(decisions).toMatchObject([{ to, decidedBy: junior.name, signedBy: senior.name }]);
		expect(await endsOf(senior, 'mine')).toEqual([]);
	});

	it('needs a session of the new level before it goes on again', async () => {
		await record(junior);
		await decideLevel(at(junior, 20), episodeId, { to: 3 });
		expect((await levelNow()).advice).toMatchObject({ suggestion: 'stay', sessionLevel: 2 });
		const { result } = await decideLevel(at(junior, 30), episodeId, { to: 4, reason: 'Strong.' });
		expect(result.state).toBe('asked');
	});

	it('that lowers the level is not undone by the session before it', async () => {
		await record(junior);
		await decideLevel(at(junior, 20), episodeId, { to: 1, reason: 'Tired, pressure low.' });
		expect((await levelNow()).advice?.suggestion).toBe('stay');
	});

	it('of a senior against the advice holds at once, under their own name', async () => {
		const input = { to: 4, reason: 'Climbs at home already.' } as const;
		expect((await decideLevel(at(senior), episodeId, input)).result.state).toBe('made');
		expect((await levelNow()).decisions).toMatchObject([{ signedBy: senior.name }]);
	});

	it('takes the place of what was proposed', async () => {
		const proposed = await decideLevel(at(junior), episodeId, { to: 4, reason: 'Strong.' });
		await decideLevel(at(senior, 1), episodeId, { to: 1 });
		await expect(sign(at(senior, 2), proposed.result.id)).rejects.toMatchObject({ code: 'wrong-state' });
		expect((await levelNow()).today).toBe(1);
	});

	it('is refused where it changes nothing, for roles that do not decide, and outside the unit', async () => {
		await expect(decideLevel(at(senior), episodeId, { to: 2 })).rejects.toMatchObject({ code: 'invalid' });
		for (const role of ['nurse', 'surgeon', 'coordinator', 'admin', 'speech-therapist'] as const) {
			const refused = decideLevel(contextOf(hospital.people[role]), episodeId, { to: 1 });
			await expect(refused).rejects.toMatchObject({ code: 'not-allowed' });
		}
		await expect(getLevel(db(), hospital.outsider, episodeId)).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('a dose beyond the cautious figure', () => {
	// Sitting in the chair: 15 to 30 minutes, common practice.
	const sitting = (minutes: number) => [{ code: 'chair-sitting' as const, minutes }];

	it.each([
		[14, 0],
		[15, 0],
		[16, 1],
		[31, 1]
	])('of %d minutes asks a senior for %d signatures', async (minutes, count) => {
		await record(junior, { activities: sitting(minutes) });
		expect(await endsOf(senior, 'mine')).toHaveLength(count);
	});

	it('asks nothing of a senior, or for what was not done', async () => {
		await record(senior, { activities: sitting(30) });
		await record(junior, { activities: [{ ...sitting(30)[0], code: 'chair-sitting', notDone: true }] });
		expect(await endsOf(senior, 'mine')).toEqual([]);
	});

	it('is signed once, and the level stays', async () => {
		await record(junior, { activities: sitting(30) });
		const [asked] = (await levelNow()).signOffs;
		expect(asked).toMatchObject({ kind: 'dose', askedBy: junior.name });
		expect(asked?.words).toContain('30 minutes is beyond the cautious 15; a senior signs.');
		await sign(at(senior, 30), asked?.id ?? '');
		await expect(sign(at(senior, 31), asked?.id ?? '')).rejects.toMatchObject({ code: 'wrong-state' });
		expect(await levelNow()).toMatchObject({ today: 2, signOffs: [], decisions: [] });
	});

	it('may be refused with a reason', async () => {
		await record(junior, { activities: sitting(30) });
		const [asked] = (await levelNow()).signOffs;
		await refuseToSign(at(senior, 30), asked?.id ?? '', 'Too long on day 2.');
		expect((await levelNow()).signOffs).toEqual([]);
	});

	it('is not signed by a junior, a nurse without the mark, or outside the unit', async () => {
		await record(junior, { activities: sitting(30) });
		const [asked] = (await levelNow()).signOffs;
		const id = asked?.id ?? '';
		for (const person of [junior, hospital.people.nurse, hospital.people.coordinator]) {
			await expect(sign(contextOf(person), id)).rejects.toMatchObject({ code: 'not-allowed' });
		}
		await expect(sign(contextOf(hospital.outsider), id)).rejects.toMatchObject({ code: 'not-found' });
	});
});

describe('the mark of a senior', () => {
	it('is given and taken by an administrator, and read with the next request', async () => {
		const person = await addPerson({ role: 'therapist', unitIds: [hospital.units.ward] });
		for (const marked of [true, false]) {
			await setSenior(contextOf(hospital.people.admin), person.id, marked);
			expect((await loadPerson(db(), person.id))?.senior).toBe(marked);
		}
	});

	it('is for roles that treat', async () => {
		const coordinator = hospital.people.coordinator.id;
		await expect(setSenior(contextOf(hospital.people.admin), coordinator, true)).rejects.toMatchObject({
			code: 'wrong-state'
		});
		await expect(setSenior(contextOf(senior), senior.id, true)).rejects.toMatchObject({
			code: 'not-allowed'
		});
	});
});
