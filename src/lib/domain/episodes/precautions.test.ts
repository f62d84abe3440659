import { describe, expect, it } from 'vitest';
import { limitsOfPatient } from '../bedside/limits/layers';
import { mayHold, precautionsOf } from './precautions';

const DAY = '2026-03-01' as const;
const done = { approach: 'sternotomy', day: DAY, begun: true } as const;

describe('precautionsOf', () => {
	it.each([
		['no operation on record', null, 'none', false],
		['one that is to come', { ...done, begun: false }, 'planned', false],
		['a sternotomy', done, 'performed', true],
		['another approach', { ...done, approach: 'other' as const }, 'performed', false]
	] as const)('%s: known from %s, sternal %s', (_, operation, basis, sternal) => {
		expect(precautionsOf(operation, null, false)).toMatchObject({ basis, sternal });
	});

	it('ends when somebody has ended them, and that is a statement', () => {
		const ended = precautionsOf(done, null, true);
		expect(ended).toEqual({
			basis: 'performed',
			sternal: false,
			endDue: null,
			maxElevationDeg: null,
			maxLoadKg: null,
			armStage: null
		});
		expect(mayHold(ended)).toBe(false);
	});

	it.each([
		[null, 45, null],
		[{ maxElevationDeg: null, maxLoadKg: null, reviewOn: null }, 90, null],
		[{ maxElevationDeg: 60, maxLoadKg: 2, reviewOn: '2026-04-01' }, 60, 2]
	])('arm stage %j: arms to %i, lifting %s', (armStage, degrees, load) => {
		expect(precautionsOf(done, armStage, false)).toMatchObject({
			maxElevationDeg: degrees,
			maxLoadKg: load,
			armStage: armStage && { reviewOn: armStage.reviewOn }
		});
	});

	it('allows no more than a limit that was set for the patient, as the rules do', () => {
		const by = { setBy: 'Orla Marsh', untilOn: '2026-03-20' };
		const own = { version: 1, key: 'arm-elevation.cleared', value: 60, ...by } as const;
		const limits = limitsOfPatient('strict', { unit: [], patient: [own] });
		const armStage = { maxElevationDeg: 90, maxLoadKg: null, reviewOn: null };
		expect(precautionsOf(done, armStage, false, limits).maxElevationDeg).toBe(60);
	});

	it('asks for the end after eight weeks: common practice, no published source', () => {
		expect(precautionsOf(done, null, false).endDue).toBe('2026-04-26');
	});
});

describe('mayHold', () => {
	it('is true as long as nobody can say that they do not', () => {
		const held = [null, { ...done, begun: false }, done, { ...done, approach: 'other' as const }];
		expect(held.map((operation) => mayHold(precautionsOf(operation, null, false)))).toEqual([
			true,
			true,
			true,
			false
		]);
	});
});
