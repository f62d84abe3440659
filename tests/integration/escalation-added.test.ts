import { asc, eq } from 'drizzle-orm';
import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { ADDED_SHOWN } from '$lib/domain/escalations/views';
import { db } from '$lib/server/db';
import { entries } from '$lib/server/db/schema';
import { alarmsOf } from '$lib/server/escalations/alarms';
import { chainJob } from '$lib/server/escalations/chain-job';
import { informOfEscalation, settleEscalation } from '$lib/server/escalations/end';
import { confirmPass, passEscalation } from '$lib/server/escalations/pass';
import { getEscalation } from '$lib/server/escalations/queries';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { at, CALL, coverWard, escalationRow, messagesOf, toldOf } from '../support/escalations';
import { addPatient, addReferral, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import type { Person } from '$lib/domain/access/actor';

const hospital = await openHospital();
let episodeId: string;

beforeAll(async () => {
	await coverWard(hospital);
});
beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
});

const as = (person: Person, seconds = 0) => contextOf(person, at(seconds));
async function call(person: Person, seconds: number, input: Partial<RaiseInput> = {}) {
	return (await raiseEscalation(as(person, seconds), episodeId, { ...CALL, ...input })).result;
}
const looseEnd = async (person: Person, id: string, seconds: number) => {
	const { mine, theirs } = await looseEndsOf(db(), person, at(seconds));
	const kinds = (ends: typeof mine) => ends.filter((end) => end.id === id).map(({ kind }) => kind);
	return { mine: kinds(mine), theirs: kinds(theirs) };
};

describe('a further call about an open one', () => {
	it('is kept whole, with who and when, and the first call stays as it was said', async () => {
		const { therapist, physician, nurse } = hospital.people;
		const { id } = await call(therapist, 0, { grade: 'medium' });
		const further = {
			grade: 'medium',
			situation: 'Dizzy on the edge of the bed.',
			background: 'Third day of the beta blocker.',
			assessment: 'Looks pale.',
			request: 'Bring the monitor.',
			neededBy: '2026-03-03T09:20:00Z',
			toldInPerson: hospital.nurse2.id
		} as const;
		await expect(call(physician, 30, further)).resolves.toMatchObject({ id, bundled: true, state: 'raised' });
		const view = await getEscalation(db(), nurse, id);
		expect(view).toMatchObject({ situation: CALL.situation, background: CALL.background, addedTotal: 1 });
		expect(view.added).toEqual([
			{
				...further,
				id: view.added[0]?.id,
				by: { id: physician.id, name: physician.name, role: 'physician' },
				at: '2026-03-03T09:00:30.000Z',
				raisedGrade: false,
				neededBy: '2026-03-03T09:20:00.000Z',
				toldInPerson: { id: hospital.nurse2.id, name: hospital.nurse2.name },
				sessionId: null,
				threadId: null
			}
		]);
	});

	it.each([
		['only the second says', undefined, '2026-03-03T09:20:00Z', '2026-03-03T09:20:00.000Z'],
		['only the first says', '2026-03-03T09:30:00Z', undefined, '2026-03-03T09:30:00.000Z'],
		['the second is earlier', '2026-03-03T09:30:00Z', '2026-03-03T09:29:59Z', '2026-03-03T09:29:59.000Z'],
		['the second is later', '2026-03-03T09:30:00Z', '2026-03-03T09:30:01Z', '2026-03-03T09:30:00.000Z']
	])('the earlier time counts: %s', async (_, first, second, counts) => {
		const { therapist, nurse } = hospital.people;
		const { id } = await call(therapist, 0, { ...(first ? { neededBy: first } : {}) });
		await call(hospital.people.physician, 10, { ...(second ? { neededBy: second } : {}) });
		expect((await getEscalation(db(), nurse, id)).neededBy).toBe(counts);
	});

	it('is heard by both threads, and so is what comes of it', async () => {
		const { surgeon, therapist, nurse } = hospital.people;
		const one = await addReferral({ episodeId, askedBy: surgeon.id });
		const two = await addReferral({ episodeId, askedBy: surgeon.id, service: 'speech-therapy' });
		const { id } = await call(therapist, 0, { threadId: one.threadId });
		await call(hospital.people['speech-therapist'], 20, { situation: 'Hoarse.', threadId: two.threadId });
		await takeEscalation(as(nurse, 30), id, null);
		const bodies = async (threadId: string) =>
			(await db().select().from(entries).where(eq(entries.threadId, threadId)).orderBy(asc(entries.seq))).map(
				({ body }) => body
			);
		expect(await bodies(one.threadId)).toEqual([`High: ${CALL.situation}`, 'High: Hoarse.', 'Taken.']);
		expect(await bodies(two.threadId)).toEqual(['High: Hoarse.', 'Taken.']);
	});

	it('shows at most so many at once, the newest, and says how many there are', async () => {
		const { therapist, nurse } = hospital.people;
		const { id } = await call(therapist, 0);
		for (let n = 1; n <= ADDED_SHOWN + 1; n += 1) {
			await call(therapist, n, { situation: `Fact ${n}.` });
		}
		const { added, addedTotal } = await getEscalation(db(), nurse, id);
		expect(addedTotal).toBe(ADDED_SHOWN + 1);
		expect(added.map(({ situation }) => situation).at(0)).toBe('Fact 2.');
		expect(added.map(({ situation }) => situation).at(-1)).toBe(`Fact ${ADDED_SHOWN + 1}.`);
	});

	it('that is graver tells everybody but its own caller, the first caller included', async () => {
		const { nurse } = hospital.people;
		const { id } = await call(nurse, 0, { grade: 'medium' });
		expect(await toldOf(id)).toEqual(['0:nurse-in-charge']);
		await call(hospital.nurse2, 60, { grade: 'high' });
		expect(await toldOf(id)).toEqual(['0:nurse-in-charge', '0:nurse']);
	});
});

describe('told in person', () => {
	it('tells the named nurse alone for two minutes, and the chain only without a yes', async () => {
		const { therapist, nurse } = hospital.people;
		const { id, chain } = await call(therapist, 0, { toldInPerson: nurse.id });
		expect(chain.map(({ afterSeconds }) => afterSeconds)).toEqual([120, 120, 240, 240, 300, 600]);
		expect((await messagesOf(id)).map(({ userId }) => userId)).toEqual([nurse.id]);
		await chainJob.run(at(119));
		expect(await toldOf(id)).toEqual([]);
		await chainJob.run(at(120));
		expect(await toldOf(id)).toEqual(['0:nurse', '0:nurse-in-charge']);
		await chainJob.run(at(240));
		expect(await toldOf(id)).toHaveLength(4);
	});

	it('runs no chain once the named nurse has it', async () => {
		const { therapist, nurse } = hospital.people;
		const { id } = await call(therapist, 0, { toldInPerson: nurse.id });
		await takeEscalation(as(nurse, 100), id, null);
		await chainJob.run(at(500));
		expect(await toldOf(id)).toEqual([]);
	});

	it.each(['therapist', 'coordinator'] as const)('counts for nothing when it was a %s', async (role) => {
		const { id } = await call(hospital.people.nurse, 0, { toldInPerson: hospital.people[role].id });
		expect(await toldOf(id)).toEqual(['0:nurse-in-charge']);
	});

	it('is no call to oneself', async () => {
		const { nurse } = hospital.people;
		const { id } = await call(nurse, 0, { toldInPerson: nurse.id, grade: 'low' });
		expect((await messagesOf(id)).map(({ userId }) => userId)).toEqual([hospital.nurse2.id]);
	});
});

describe('passing on', () => {
	it('is a loose end of the receiver until they confirm, and history names both', async () => {
		const { therapist, nurse, physician } = hospital.people;
		const { id } = await call(therapist, 0);
		await takeEscalation(as(nurse, 10), id, null);
		await passEscalation(as(nurse, 20), id, { to: physician.id, reason: 'Needs a physician.' });
		expect(await looseEnd(physician, id, 30)).toEqual({ mine: ['confirm'], theirs: [] });
		expect(await looseEnd(nurse, id, 30)).toEqual({ mine: ['escalation-taken'], theirs: ['confirm'] });
		await confirmPass(as(physician, 40), id);
		expect(await looseEnd(physician, id, 50)).toEqual({ mine: ['escalation-taken'], theirs: [] });
		expect(await looseEnd(nurse, id, 50)).toEqual({ mine: [], theirs: [] });
		const { moves } = await getEscalation(db(), nurse, id);
		expect(moves.slice(-2)).toMatchObject([
			{ kind: 'passed', by: nurse.name, other: physician.name },
			{ kind: 'confirmed', by: physician.name, other: nurse.name }
		]);
		expect(await escalationRow(id)).toMatchObject({ askHolderAt: at(640), passTo: null });
	});
});

describe('the strip over every screen', () => {
	it.each(['speech-therapist', 'coordinator', 'admin', 'therapist', 'surgeon'] as const)(
		'shows an untaken high one to a %s of the unit, without what it is about',
		async (role) => {
			const { id } = await call(hospital.people.therapist, 0);
			const shown = (await alarmsOf(db(), hospital.people[role])).filter((alarm) => alarm.id === id);
			expect(shown).toEqual([
				{
					id,
					unitId: hospital.units.ward,
					unit: 'Tern Ward',
					bed: null,
					grade: 'high',
					raisedAt: '2026-03-03T09:00:00.000Z',
					taken: false,
					chainSpent: false
				}
			]);
			expect((await alarmsOf(db(), hospital.outsider)).map((alarm) => alarm.id)).not.toContain(id);
		}
	);

	it('shows neither a lesser one nor one that somebody has', async () => {
		const medium = await call(hospital.people.therapist, 0, { grade: 'medium' });
		({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
		const high = await call(hospital.people.therapist, 0);
		await takeEscalation(as(hospital.people.nurse, 5), high.id, null);
		const shown = (await alarmsOf(db(), hospital.people.nurse)).map((alarm) => alarm.id);
		expect(shown).not.toContain(medium.id);
		expect(shown).not.toContain(high.id);
	});
});

describe('settling', () => {
	const settled = { outcome: 'Better', note: '122/70 after rest.' };

	it.each([
		['a nurse, a high one, no physician named', 'nurse', 'high', {}, ['physician-to-tell']],
		['a nurse who names one', 'nurse', 'high', { informed: 'Marta Lisowska' }, []],
		['a physician', 'physician', 'high', {}, []],
		['a nurse, a medium one', 'nurse', 'medium', {}, []]
	] as const)('by %s leaves open: %5$s', async (_, role, grade, more, open) => {
		const taker = hospital.people[role];
		const { id } = await call(hospital.people.therapist, 0, { grade });
		await takeEscalation(as(taker, 10), id, null);
		await settleEscalation(as(taker, 60), id, { ...settled, ...more });
		expect((await looseEnd(taker, id, 70)).mine).toEqual(open);
	});

	it('is completed by naming the physician, once', async () => {
		const { therapist, nurse } = hospital.people;
		const { id } = await call(therapist, 0);
		await takeEscalation(as(nurse, 10), id, null);
		await expect(informOfEscalation(as(nurse, 20), id, 'Marta')).rejects.toMatchObject({
			code: 'wrong-state'
		});
		await settleEscalation(as(nurse, 60), id, settled);
		await informOfEscalation(as(nurse, 90), id, 'Marta Lisowska');
		expect((await looseEnd(nurse, id, 100)).mine).toEqual([]);
		expect((await getEscalation(db(), nurse, id)).informed).toBe('Marta Lisowska');
		await expect(informOfEscalation(as(nurse, 120), id, 'Other')).rejects.toMatchObject({
			code: 'wrong-state'
		});
	});

	it('with a re-check is a loose end until the next session, with its time', async () => {
		const { therapist, nurse } = hospital.people;
		const { id } = await call(therapist, 0);
		await takeEscalation(as(nurse, 10), id, null);
		await settleEscalation(as(nurse, 60), id, { ...settled, informed: 'M. L.', recheckMinutes: 15 });
		const { mine } = await looseEndsOf(db(), nurse, at(60 + 15 * 60));
		expect(mine.find((end) => end.id === id)).toMatchObject({
			kind: 'recheck',
			due: '2026-03-03T09:16:00.000Z'
		});
	});
});
