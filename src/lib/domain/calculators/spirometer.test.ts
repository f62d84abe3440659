import { expect, it } from 'vitest';
import { BALL_FLOWS_ML_PER_S, breathesTooOften, breathEstimateMl, capacityTooSmall } from './spirometer';

/** Flows: published instructions (600 and 1200 mL/s) and a leaflet (900, secondary); volume is flow times seconds. */
it.each([
	[1, 3, 1800],
	[2, 3, 2700],
	[3, 3, 3600],
	[3, 2, 2400],
	[0, 3, null],
	[4, 3, null]
])('%d balls for %d s is about %s mL', (balls, seconds, expected) => {
	expect(breathEstimateMl(balls, seconds)).toBe(expected);
});

// From memory, not yet verified.
it.each([
	[20, false],
	[21, true]
])('%d breaths in an hour are too many: %s', (breaths, expected) => {
	expect(breathesTooOften(breaths)).toBe(expected);
});

// 10 mL per kg: from memory, not yet verified.
it.each([
	[780, true],
	[799.9, true],
	[800, false]
])('a vital capacity of %d mL at 80 kg is too small: %s', (capacity, expected) => {
	expect(capacityTooSmall(capacity, 80)).toBe(expected);
});

// 600 and 1200 mL/s: world.physio congress abstract; 900: a leaflet. The marks are flows, and not volumes.
it('the balls rise at 36, 54 and 72 L/min', () => {
	expect(BALL_FLOWS_ML_PER_S.map((flow) => (flow * 60) / 1000)).toEqual([36, 54, 72]);
});
