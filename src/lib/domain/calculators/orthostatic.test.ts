import { expect, it } from 'vitest';
import { orthostatic, type OrthostaticCriterion } from './orthostatic';

/** Computed from the consensus of 2011 as summarised (doi 10.1007/978-3-030-62493-4_5); sitting: Shaw 2017, PMC5542884; both published. */
it.each<[OrthostaticCriterion, number, number, number, number, number, number, boolean]>([
	['lying-to-standing', 138, 80, 116, 72, 22, 8, true],
	['lying-to-standing', 128, 78, 112, 69, 16, 9, false],
	['lying-to-standing', 130, 82, 118, 71, 12, 11, true],
	['lying-to-standing', 170, 90, 144, 84, 26, 6, true],
	['high-lying-to-standing', 170, 90, 144, 84, 26, 6, false],
	['high-lying-to-standing', 170, 90, 140, 84, 30, 6, true],
	['sitting-to-standing', 126, 76, 111, 70, 15, 6, true],
	['lying-to-standing', 126, 76, 111, 70, 15, 6, false],
	['sitting-to-standing', 126, 76, 111.1, 69.1, 14.9, 6.9, false],
	['sitting-to-standing', 126, 76, 120, 69, 6, 7, true],
	// Exactly 20 or 10 is positive; a tenth less is not.
	['lying-to-standing', 130, 80, 110, 75, 20, 5, true],
	['lying-to-standing', 130, 80, 125, 70, 5, 10, true],
	['lying-to-standing', 130, 80, 110.1, 70.1, 19.9, 9.9, false],
	// 128.2 - 108.2 is 19.999999999999986 in binary: 20 on paper, which counts.
	['lying-to-standing', 128.2, 78, 108.2, 72, 20, 6, true],
	['lying-to-standing', 120, 80, 130, 84, -10, -4, false]
])(
	'%s from %d/%d to %d/%d falls by %d and %d: %s',
	(criterion, sbp, dbp, toSbp, toDbp, systolic, diastolic, positive) => {
		const found = orthostatic(criterion, { sbp, dbp }, { sbp: toSbp, dbp: toDbp });
		expect(found.systolicFall).toBeCloseTo(systolic, 9);
		expect(found.diastolicFall).toBeCloseTo(diastolic, 9);
		expect(found.positive).toBe(positive);
	}
);
