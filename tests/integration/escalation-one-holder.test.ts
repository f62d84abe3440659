import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Person } from '$lib/domain/access/actor';
import { Problem } from '$lib/domain/core/errors';
import { db } from '$lib/server/db';
import { chainJob } from '$lib/server/escalations/chain-job';
import { holderJob } from '$lib/server/escalations/holder-job';
import { arriveAtEscalation } from '$lib/server/escalations/arrive';
import { confirmPass, passEscalation } from '$lib/server/escalations/pass';
import { getEscalation } from '$lib/server/escalations/queries';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { untakeEscalation } from '$lib/server/escalations/undo';
import { at, CALL, coverWard, escalationRow } from '../support/escalations';
import { addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();

beforeAll(async () => {
	await coverWard(hospital);
});

type Deed = { who: 0 | 1 | 2; what: 'take' | 'untake' | 'pass' | 'confirm' | 'arrive'; to: 0 | 1 | 2 };
const person = fc.constantFrom(0 as const, 1 as const, 2 as const);
const deed: fc.Arbitrary<Deed> = fc.record({
	who: person,
	what: fc.constantFrom('take', 'take', 'untake', 'pass', 'confirm', 'arrive'),
	to: person
});
/** Deeds that are sent at the same moment, and the seconds that pass before the next ones. */
const rounds = fc.array(
	fc.record({ deeds: fc.array(deed, { minLength: 1, maxLength: 4 }), wait: fc.constantFrom(1, 4, 120, 700) }),
	{ minLength: 1, maxLength: 6 }
);

function perform(people: Person[], id: string, { who, what, to }: Deed, now: number): Promise<unknown> {
	const actor = people[who] as Person;
	const context = contextOf(actor, now);
	switch (what) {
		case 'take':
			return takeEscalation(context, id, null);
		case 'untake':
			return untakeEscalation(context, id);
		case 'pass':
			return passEscalation(context, id, { to: (people[to] as Person).id, reason: 'Busy.' });
		case 'confirm':
			return confirmPass(context, id);
		case 'arrive':
			return arriveAtEscalation(context, id);
	}
}

describe('whatever people do at once', () => {
	it('there is one holder or none, and while there is none the chain has its timer', async () => {
		const { nurse, physician, therapist } = hospital.people;
		const people = [nurse, hospital.nurse2, physician];
		await fc.assert(
			fc.asyncProperty(rounds, async (played) => {
				const { episodeId } = await addPatient({ unitId: hospital.units.ward });
				const { id } = (await raiseEscalation(contextOf(therapist, at(0)), episodeId, CALL)).result;
				let second = 0;
				for (const { deeds, wait } of played) {
					second += wait;
					const answers = await Promise.allSettled(
						deeds.map((each) => perform(people, id, each, at(second)))
					);
					for (const answer of answers) {
						// Whoever came second is told so in words; nothing breaks.
						expect(answer.status === 'fulfilled' || answer.reason instanceof Problem).toBe(true);
					}
					await chainJob.run(at(second));
					await holderJob.run(at(second));
					await expectConsistent(id);
				}
			}),
			{ numRuns: 40 }
		);
	}, 60_000);

	it('of parallel takes one wins, and every other is told who', async () => {
		const { therapist } = hospital.people;
		const people = [
			hospital.people.nurse,
			hospital.nurse2,
			hospital.people.physician,
			hospital.people.surgeon
		];
		const { episodeId } = await addPatient({ unitId: hospital.units.ward });
		const { id } = (await raiseEscalation(contextOf(therapist, at(0)), episodeId, CALL)).result;
		const answers = await Promise.allSettled(
			people.map((each) => takeEscalation(contextOf(each, at(5)), id, null))
		);
		expect(answers.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
		const holder = (await getEscalation(db(), therapist, id)).holder;
		for (const answer of answers) {
			if (answer.status === 'rejected') {
				expect(answer.reason).toMatchObject({ code: 'already-taken', extra: { takenBy: holder } });
			}
		}
	});
});

async function expectConsistent(id: string): Promise<void> {
	const row = await escalationRow(id);
	const { moves } = await getEscalation(db(), hospital.people.nurse, id);
	const won = moves.filter(({ kind }) => kind === 'taken' || kind === 'confirmed' || kind === 'untaken');
	if (row.state === 'raised') {
		expect(row).toMatchObject({ takenBy: null, passTo: null, askHolderAt: null });
		expect(row.nextStepAt).not.toBeNull();
		return;
	}
	expect(row.state).toBe('taken');
	expect(row.takenBy).not.toBeNull();
	expect(won.length).toBeGreaterThan(0);
	// It cannot die: somebody is there, will be asked, or others are sought.
	expect(row.arrivedAt ?? row.askHolderAt ?? row.nextStepAt).not.toBeNull();
}
