import { expect, it } from 'vitest';
import { corridorWalk } from './corridor';

it.each([
	// 400 m in six minutes: 66.67 m/min, 10.17 mL/kg/min, 2.90 METs by the ACSM walking equation, published.
	[50, 4, 360, 0, 400, 66.667, 2.905, true],
	[50, 2, 420, 35, 235, 33.571, 1.959, false],
	[30, 6, 360, 12, 372, 62, 2.771, true]
])(
	'a corridor of %d m, %d laps in %d s and %d m more',
	(lengthM, laps, seconds, extraM, distance, speed, mets, inRange) => {
		const found = corridorWalk(lengthM, laps, seconds, extraM);
		expect(found.distanceM).toBe(distance);
		expect(found.speedMPerMin).toBeCloseTo(speed, 3);
		expect(found.mets).toBeCloseTo(mets, 3);
		expect(found.inRange).toBe(inRange);
	}
);

it('has no speed before the clock has run', () => {
	expect(corridorWalk(50, 1, 0)).toEqual({ distanceM: 100, speedMPerMin: null, mets: null, inRange: false });
});
