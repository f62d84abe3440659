import { beforeAll, describe, expect, it } from 'vitest';
import type { Grade } from '$lib/domain/core/codes';
import { db } from '$lib/server/db';
import { alarmsOf } from '$lib/server/escalations/alarms';
import { chainJob } from '$lib/server/escalations/chain-job';
import { raiseEscalation } from '$lib/server/escalations/raise';
import { takeEscalation } from '$lib/server/escalations/take';
import { untakeEscalation } from '$lib/server/escalations/undo';
import { eventsAfter, liveCursor } from '$lib/server/live/log';
import { at, CALL, coverWard } from '../support/escalations';
import { addPatient, contextOf } from '../support/hospital';
import { openHospital } from '../support/open-hospital';

const hospital = await openHospital();

beforeAll(async () => {
	await coverWard(hospital);
});

async function call(grade: Grade, unitId = hospital.units.ward) {
	const { episodeId } = await addPatient({ unitId });
	const context = contextOf(hospital.people.therapist, at(0));
	return (await raiseEscalation(context, episodeId, { ...CALL, grade })).result.id;
}
const shown = async (id: string) =>
	(await alarmsOf(db(), hospital.people.coordinator)).filter((alarm) => alarm.id === id);

/** Which alarm events about a call the work makes. */
async function alarmsHeard(id: string, work: () => Promise<unknown>): Promise<string[]> {
	const cursor = await liveCursor();
	await work();
	const events = await eventsAfter(db(), cursor);
	return events.filter((event) => event.topic === 'alarm' && event.id === id).map(({ kind }) => kind);
}

describe('the screens of a unit at the end of a chain', () => {
	// The last planned step of each grade, in seconds: common practice, no published source.
	it.each([
		['medium', [0, 600], 1800],
		['low', [0, 3600], 14400]
	] as const)('show a %s call once everybody was told, and hear of it then', async (grade, earlier, last) => {
		const id = await call(grade);
		for (const second of [...earlier, last - 1]) {
			expect(await alarmsHeard(id, () => chainJob.run(at(second)))).toEqual([]);
			expect(await shown(id)).toEqual([]);
		}
		expect(await alarmsHeard(id, () => chainJob.run(at(last)))).toEqual(['told']);
		expect(await shown(id)).toMatchObject([{ grade, chainSpent: true, taken: false }]);
	});

	it('show it until somebody has it, and again when the taking is taken back', async () => {
		const id = await call('medium');
		await chainJob.run(at(1800));
		const nurse = (second: number) => contextOf(hospital.people.nurse, at(second));
		expect(await alarmsHeard(id, () => takeEscalation(nurse(1801), id, null))).toEqual(['taken']);
		expect(await shown(id)).toEqual([]);
		expect(await alarmsHeard(id, () => untakeEscalation(nurse(1802), id))).toEqual(['untaken']);
		expect(await shown(id)).toHaveLength(1);
	});

	it('show a low call at once where nobody covers any post, and hear of it with the raising', async () => {
		const cursor = await liveCursor();
		const id = await call('low', hospital.units.gym);
		expect(await shown(id)).toMatchObject([{ grade: 'low', chainSpent: true }]);
		const heard = (await eventsAfter(db(), cursor)).filter((event) => event.id === id);
		expect(heard.map(({ topic }) => topic)).toEqual(['escalation', 'alarm']);
	});

	it('put the graver first', async () => {
		const low = await call('low', hospital.units.gym);
		const high = await call('high', hospital.units.gym);
		const ids = (await alarmsOf(db(), hospital.people.admin)).map(({ id }) => id);
		expect(ids.indexOf(high)).toBeLessThan(ids.indexOf(low));
	});
});
