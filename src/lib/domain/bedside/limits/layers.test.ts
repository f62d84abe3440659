import { describe, expect, it } from 'vitest';
import { assess } from '../assess';
import { LIMIT_KEYS, SETS, type LimitKey } from '../codes';
import { only, session } from '../testing/sample';
import {
	directionOf,
	limitsOfPatient,
	limitsOfUnit,
	setOfUnit,
	type PatientLimit,
	type UnitChange
} from './layers';
import { limitFault, rangeOf } from './ranges';
import { DEFAULT_LIMITS } from './table';

function change(version: number, over: Partial<UnitChange>): UnitChange {
	const agreed = { agreedBy: 'Maeve Tidewell', agreedOn: '2026-02-02' };
	return { version, set: 'strict', key: 'systolic-fall', value: 15, ...agreed, ...over };
}
function own(version: number, key: LimitKey, value: number): PatientLimit {
	return { version, key, value, setBy: 'Orla Marsh', untilOn: '2026-03-05' };
}

const RANGE = {
	version: 3,
	hrMin: 90,
	hrMax: 118,
	rpeMin: 11,
	rpeMax: 13,
	method: 'walk-test',
	prescribedBy: 'Orla Marsh',
	prescribedOn: '2026-03-01'
} as const;

describe('setOfUnit', () => {
	it.each([
		['nothing chosen', [], 'inpatient', 'strict'],
		['guideline chosen', [change(1, { key: null, set: 'guideline' })], 'inpatient', 'guideline'],
		[
			'chosen and taken back',
			[change(2, { key: null, set: 'strict' }), change(1, { key: null, set: 'guideline' })],
			'inpatient',
			'strict'
		],
		['an outpatient', [change(1, { key: null, set: 'guideline' })], 'outpatient', 'outpatient'],
		['a limit of another set', [change(1, { set: 'guideline' })], 'inpatient', 'strict']
	] as const)('%s', (_what, changes, phase, expected) => {
		expect(setOfUnit(changes, phase)).toBe(expected);
	});
});

describe('limitsOfUnit', () => {
	it('are the defaults where the unit changed nothing', () => {
		expect(limitsOfUnit('strict', []).version).toBe('strict/2');
	});

	it('name who answers for a change, since when, and what the default was', () => {
		const { version, limits } = limitsOfUnit('strict', [change(3, {})]);
		expect(version).toBe('strict/2+unit 3');
		expect(limits['systolic-fall']).toMatchObject({
			value: 15,
			version: 'unit 3',
			local: true,
			source: 'set by the unit: Maeve Tidewell, 2026-02-02 (default 10)'
		});
	});

	it('the newest change of a limit holds, whatever order they come in', () => {
		const changes = [change(2, { value: 12 }), change(1, { value: 15 })];
		expect(limitsOfUnit('strict', changes).limits['systolic-fall']?.value).toBe(12);
	});

	it('a change taken back leaves the default', () => {
		const { version, limits } = limitsOfUnit('strict', [change(1, {}), change(2, { value: null })]);
		expect([limits['systolic-fall']?.value, limits['systolic-fall']?.local, version]).toEqual([
			10,
			false,
			'strict/2'
		]);
	});

	it('hold in their own set alone', () => {
		expect(limitsOfUnit('guideline', [change(1, {})]).limits['systolic-fall']?.value).toBe(10);
	});

	// A wider rise was not meant for those on a rate-slowing drug; a narrower one was, and so is switching it on.
	it.each([
		['strict', 25, 12],
		['strict', 12, 12],
		['strict', 11, 11],
		['outpatient', 30, 30]
	] as const)('%s: a rise of %d leaves %d with a rate-slowing drug', (set, value, drug) => {
		const { limits } = limitsOfUnit(set, [change(1, { set, key: 'heart-rate-rise', value })]);
		expect(limits['heart-rate-rise']?.value).toBe(value);
		expect(limits['heart-rate-rise.beta-blocked']?.value).toBe(drug);
	});
});

describe('limitsOfPatient', () => {
	it('come on top of those of the unit, and say until when', () => {
		const set = limitsOfPatient('strict', { unit: [change(3, {})], patient: [own(2, 'systolic-fall', 8)] });
		expect(set.version).toBe('strict/2+unit 3+patient 2');
		expect(set.limits['systolic-fall']).toMatchObject({
			value: 8,
			version: 'patient 2',
			source: 'set for this patient by Orla Marsh until 2026-03-05 (otherwise 15)'
		});
	});

	it('hold in every set, and switch on what is off', () => {
		for (const set of SETS) {
			const { limits } = limitsOfPatient(set, { unit: [], patient: [own(1, 'systolic-rise', 25)] });
			expect(limits['systolic-rise']?.value).toBe(25);
		}
	});

	it.each([
		[118, 118, 'prescribed 3'],
		[140, 140, 'prescribed 3']
	])('take a range of an outpatient with a top of %d', (hrMax, value, version) => {
		const prescribed = { ...RANGE, hrMax };
		const set = limitsOfPatient('outpatient', { unit: [], patient: [], prescribed });
		expect(set.version).toBe('outpatient/2+prescribed 3');
		expect(set.limits['heart-rate-ceiling']).toMatchObject({
			value,
			version,
			source: 'range prescribed for this patient by Orla Marsh, 2026-03-01 (walk-test)'
		});
		expect(set.limits['exertion-ceiling']).toMatchObject({ value: 15, version });
		expect(set.limits['exertion-ceiling.caution']).toMatchObject({ value: 13, version });
	});

	// The programme's range is for this patient, and so is a physician's limit; a unit's change is for everybody.
	it.each([
		['a wider one of the unit', { unit: 140 }, 150],
		['a narrower one of the unit', { unit: 120 }, 150],
		['a narrower one of the patient', { patient: 125 }, 125],
		['a wider one of the patient', { patient: 160 }, 150]
	] as const)('leave %s: %o', (_what, { unit, patient }: { unit?: number; patient?: number }, value) => {
		const key = 'heart-rate-ceiling';
		const { limits } = limitsOfPatient('outpatient', {
			unit: unit ? [change(1, { set: 'outpatient', key, value: unit })] : [],
			patient: patient ? [own(1, key, patient)] : [],
			prescribed: { ...RANGE, hrMax: 150 }
		});
		expect(limits[key]?.value).toBe(value);
	});

	it.each(['strict', 'guideline'] as const)('leave a range aside in the set %s', (set) => {
		const laid = limitsOfPatient(set, { unit: [], patient: [], prescribed: RANGE });
		expect(laid.version).toBe(`${set}/2`);
		expect(laid.limits['heart-rate-ceiling']?.value).toBe(130);
	});

	it('judge a session, and every finding names set, limit and version', () => {
		const limits = limitsOfPatient('strict', { unit: [], patient: [own(4, 'systolic-fall', 6)] });
		const input = session({ during: [], before: { sbp: 130 }, after: { sbp: 123 } });
		expect(only(assess(input, limits), 'systolic-fall')).toMatchObject({
			grade: 'stop',
			limit: 6,
			set: 'strict',
			version: 'patient 4'
		});
	});
});

it.each([
	['over', 10, 8, 'narrower'],
	['over', 10, 12, 'wider'],
	['at', 110, 100, 'narrower'],
	['under', 90, 95, 'narrower'],
	['under', 90, 85, 'wider'],
	['under', 90, 90, null]
] as const)('%s %d set to %d is %s', (when, value, to, expected) => {
	expect(directionOf({ when, value }, to)).toBe(expected);
});

describe('the range of a limit', () => {
	it.each(LIMIT_KEYS)('%s holds its default in every set', (key) => {
		for (const set of SETS) {
			const limit = DEFAULT_LIMITS[set][key];
			expect(limit === null ? null : limitFault(key, limit.value)).toBeNull();
		}
	});

	it.each(LIMIT_KEYS)('%s is refused just outside, with field, value and limit', (key) => {
		const { low, high } = rangeOf(key);
		expect([limitFault(key, low), limitFault(key, high)]).toEqual([null, null]);
		expect(limitFault(key, low - 0.1)).toContain(
			`New value: ${low - 0.1} cannot be taken; write a number from ${low}`
		);
		expect(limitFault(key, high + 0.1)).toContain(`to ${high}.`);
	});
});
