import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { movesFor } from '$lib/domain/escalations/moves';
import { db } from '$lib/server/db';
import { settleEscalation, withdrawEscalation } from '$lib/server/escalations/end';
import { passEscalation } from '$lib/server/escalations/pass';
import { getEscalation } from '$lib/server/escalations/queries';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { looseEndsOf } from '$lib/server/loose-ends/queries';
import { at, CALL, coverWard, escalationRow, messagesOf } from '../support/escalations';
import { addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();
let episodeId: string;
let id: string;
let first: Person;
let second: Person;

beforeAll(async () => {
	await coverWard(hospital);
	first = hospital.people.therapist;
	second = hospital.people['speech-therapist'];
});
beforeEach(async () => {
	({ episodeId } = await addPatient({ unitId: hospital.units.ward }));
	id = await call(first, 0);
});

const as = (person: Person, seconds = 0) => contextOf(person, at(seconds));
async function call(person: Person, seconds: number, input: Partial<RaiseInput> = {}) {
	return (await raiseEscalation(as(person, seconds), episodeId, { ...CALL, ...input })).result.id;
}
const waiting = async (person: Person, seconds: number) => {
	const { mine, theirs } = await looseEndsOf(db(), person, at(seconds));
	const kinds = (ends: typeof mine) => ends.filter((end) => end.id === id).map(({ kind }) => kind);
	return { mine: kinds(mine), theirs: kinds(theirs) };
};
const offers = async (person: Person) => movesFor(await getEscalation(db(), person, id), person);

describe('withdrawing a call that others have called into', () => {
	it.each([
		['untaken', false],
		['taken', true]
	])('is refused while it is %s, names them, and stops no message', async (_, taken) => {
		await call(second, 20, { situation: 'Cannot be woken.' });
		if (taken) {
			await takeEscalation(as(hospital.people.nurse, 25), id, null);
		}
		const before = [await escalationRow(id), await messagesOf(id)];
		const refused = withdrawEscalation(as(first, 30), id, 'A mistake.');
		await expect(refused).rejects.toMatchObject({
			code: 'wrong-state',
			status: 409,
			detail: expect.stringContaining(second.name),
			extra: { callers: [{ id: second.id, name: second.name }] }
		});
		expect([await escalationRow(id), await messagesOf(id)]).toEqual(before);
		expect(await offers(first)).not.toContain('withdraw');
	});

	it('names each of them once, in the order of their calls', async () => {
		const third = hospital.people.physician;
		for (const [person, seconds] of [
			[third, 10],
			[second, 20],
			[third, 30],
			[first, 40]
		] as const) {
			await call(person, seconds);
		}
		const { otherCallers } = await getEscalation(db(), first, id);
		expect(otherCallers.map((caller) => caller.id)).toEqual([third.id, second.id]);
	});

	it('is possible when only its raiser has added to it', async () => {
		await call(first, 20, { situation: 'And pale.' });
		expect(await offers(first)).toContain('withdraw');
		await withdrawEscalation(as(first, 30), id, 'The wrong patient.');
		expect((await escalationRow(id)).state).toBe('withdrawn');
	});

	it('leaves nobody waiting to confirm it', async () => {
		const { nurse, physician } = hospital.people;
		await takeEscalation(as(nurse, 10), id, null);
		await passEscalation(as(nurse, 20), id, { to: physician.id, reason: 'Needs a physician.' });
		expect(await escalationRow(id)).toMatchObject({ passTo: physician.id });
		await withdrawEscalation(as(first, 30), id, 'The wrong patient.');
		const ended = { state: 'withdrawn', passTo: null, passReason: null, nextStep: null, nextStepAt: null };
		expect(await escalationRow(id)).toMatchObject(ended);
	});

	it('is not for who only called into it', async () => {
		await call(second, 20);
		await expect(withdrawEscalation(as(second, 30), id, 'Mine.')).rejects.toMatchObject({
			code: 'not-allowed'
		});
	});
});

describe('whoever has called into it', () => {
	it('waits for it as its raiser does, until it is settled', async () => {
		const { nurse } = hospital.people;
		expect(await waiting(second, 10)).toEqual({ mine: [], theirs: [] });
		await call(second, 20);
		for (const person of [first, second]) {
			expect(await waiting(person, 21)).toEqual({ mine: [], theirs: ['escalation'] });
		}
		await takeEscalation(as(nurse, 30), id, null);
		for (const person of [first, second]) {
			expect(await waiting(person, 31)).toEqual({ mine: [], theirs: ['escalation-taken'] });
		}
		expect((await waiting(nurse, 31)).mine).toEqual(['escalation-taken']);
		const outcome = { outcome: 'Better', note: 'Rest.', informed: 'M. L.', recheckMinutes: 15 };
		await settleEscalation(as(nurse, 60), id, outcome);
		expect(await waiting(second, 61)).toEqual({ mine: [], theirs: ['recheck'] });
	});

	it('and takes it themselves has it, and does not wait for themselves', async () => {
		await call(hospital.nurse2, 20);
		expect(await waiting(hospital.nurse2, 21)).toEqual({ mine: [], theirs: ['escalation'] });
		await takeEscalation(as(hospital.nurse2, 30), id, null);
		expect(await waiting(hospital.nurse2, 31)).toEqual({ mine: ['escalation-taken'], theirs: [] });
	});
});
