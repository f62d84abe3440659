import { eq } from 'drizzle-orm';
import { beforeEach, describe, expect, it } from 'vitest';
import { ROLES } from '$lib/domain/core/codes';
import { recordSession } from '$lib/server/bedside/actions';
import { db } from '$lib/server/db';
import { audit } from '$lib/server/db/schema';
import { newId } from '$lib/server/ids';
import { unitLimitsOf } from '$lib/server/limits/queries';
import { changeUnitLimit, chooseUnitSet } from '$lib/server/limits/unit-actions';
import { listen, type LoggedEvent } from '$lib/server/live/hub';
import { addWard, contextOf, type Hospital } from '../support/hospital';
import { openHospital } from '../support/open-hospital';
import { sessionFalling } from '../support/session-falling';

const hospital = await openHospital();
let unitId: string;
let episodeId: string;

const AGREED = { agreedBy: 'Maeve Tidewell', agreedOn: '2026-03-01' };
const FALL = { set: 'strict', key: 'systolic-fall', value: 15, ...AGREED } as const;

beforeEach(async () => {
	({ unitId, episodeId } = await addWard(hospital));
});

const as = (role: keyof Hospital['people'], minutes = 0) =>
	contextOf(hospital.people[role], hospital.now + minutes * 60_000);
const thing = (set: string, key: string | null, value: number | null) => ({ set, key, value });

const session = (fall: number, minutes = 10) => sessionFalling(fall, hospital.now + minutes * 60_000);
async function judged(fall: number, minutes = 10) {
	const { result } = await recordSession(as('therapist', minutes), episodeId, session(fall, minutes));
	return result.findings.filter(({ rule }) => rule === 'systolic-fall');
}

describe('a limit of a unit', () => {
	it('is numbered, keeps who answers for it, and is on record', async () => {
		const { result } = await changeUnitLimit(as('admin'), unitId, FALL);
		expect(result.version).toBe(1);
		await changeUnitLimit(as('admin', 1), unitId, { ...FALL, value: null });
		const { changes } = await unitLimitsOf(db(), unitId);
		expect(
			changes.map(({ version, value, agreedBy, agreedOn }) => [version, value, agreedBy, agreedOn])
		).toEqual([
			[2, null, 'Maeve Tidewell', '2026-03-01'],
			[1, 15, 'Maeve Tidewell', '2026-03-01']
		]);
		expect(changes.map(({ changedBy }) => changedBy)).toEqual(Array(2).fill(hospital.people.admin.name));
		const rows = await db().select().from(audit).where(eq(audit.objectId, unitId));
		expect(rows.map(({ action, detail }) => [action, detail])).toEqual([
			['unit.limit-changed', { set: 'strict', key: 'systolic-fall', value: 15, was: 10, version: 1 }],
			['unit.limit-changed', { set: 'strict', key: 'systolic-fall', value: null, was: 15, version: 2 }]
		]);
	});

	it('judges the sessions recorded after it, and not those before', async () => {
		expect(await judged(12)).toMatchObject([{ grade: 'stop', limit: 10, set: 'strict', version: '2' }]);
		await changeUnitLimit(as('admin', 20), unitId, FALL);
		expect(await judged(12, 30)).toMatchObject([{ grade: 'caution', limit: 15, version: 'unit 1' }]);
		// Entered afterwards: what held then judges it.
		const late = await recordSession(as('therapist', 40), episodeId, session(12, 15));
		expect(late.result.findings.find(({ rule }) => rule === 'systolic-fall')).toMatchObject({ limit: 10 });
	});

	it('is heard of by whoever has a patient of the unit open', async () => {
		const heard: LoggedEvent[] = [];
		const stop = listen((event) => heard.push(event));
		await changeUnitLimit(as('admin'), unitId, FALL);
		stop();
		expect(heard).toMatchObject([{ topic: 'episode', kind: 'limits-changed', episodeId, unitId }]);
	});

	it.each([
		['out of range', { ...FALL, value: 61 }, 'New value: 61 cannot be taken; write a number from 2 to 60.'],
		['what holds already', { ...FALL, value: 10 }, 'New value: 10 holds already.'],
		['the default again', { ...FALL, value: null }, 'New value is empty: the default holds already.'],
		[
			'a day to come',
			{ ...FALL, agreedOn: '2026-03-04' },
			'Agreed on: Wednesday 4 March 2026 lies ahead; write today, Tuesday 3 March 2026, or an earlier day.'
		]
	])('is refused: %s', async (_what, input, message) => {
		const refused = changeUnitLimit(as('admin'), unitId, input);
		await expect(refused).rejects.toMatchObject({ code: 'invalid', extra: { errors: [{ message }] } });
		expect((await unitLimitsOf(db(), unitId)).changes).toEqual([]);
	});

	it.each(ROLES.filter((role) => role !== 'admin'))('is not changed by a %s', async (role) => {
		await expect(changeUnitLimit(as(role), unitId, FALL)).rejects.toMatchObject({ code: 'not-allowed' });
	});

	it('of a unit that is not there is not found', async () => {
		await expect(changeUnitLimit(as('admin'), newId(), FALL)).rejects.toMatchObject({ code: 'not-found' });
	});

	it('cannot be changed behind the record’s back', async () => {
		await changeUnitLimit(as('admin'), unitId, FALL);
		await expect(db().run('update unit_limit_changes set value = 1')).rejects.toThrow();
	});
});

describe('the set of a unit', () => {
	it('judges its inpatients, unless a session names another', async () => {
		await chooseUnitSet(as('admin'), unitId, { set: 'guideline', ...AGREED });
		const { result } = await recordSession(as('therapist', 10), episodeId, session(12));
		expect(result.findings.find(({ rule }) => rule === 'systolic-fall')).toMatchObject({ set: 'guideline' });
		const { changes, inpatientSet } = await unitLimitsOf(db(), unitId);
		expect(inpatientSet).toBe('guideline');
		expect(changes).toMatchObject([thing('guideline', null, null)]);
	});

	it('is refused where it is chosen already', async () => {
		const refused = chooseUnitSet(as('admin'), unitId, { set: 'strict', ...AGREED });
		await expect(refused).rejects.toMatchObject({ code: 'invalid' });
	});
});

it('a client that believes in other limits is judged by those on record', async () => {
	const body = session(12);
	const believed = { ...body, context: { ...body.context, limits: { 'systolic-fall': 40 } } };
	const { result } = await recordSession(as('therapist', 10), episodeId, believed);
	expect(result.findings.find(({ rule }) => rule === 'systolic-fall')).toMatchObject({ limit: 10 });
});
