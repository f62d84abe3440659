import { expect, it } from 'vitest';
import { doubtAbout } from './doubts';

// Plausible ranges: from memory, not yet verified; just under, at and just over each end.
it.each([
	['hr', 40, 150],
	['pulse', 40, 150],
	['resting', 40, 150],
	['sbp', 80, 200],
	['dbp', 40, 120],
	['spo2', 85, 100],
	['rr', 8, 35],
	['temperature', 34, 40],
	['age', 18, 95],
	['ageYears', 18, 95],
	['weightKg', 40, 180],
	['heightCm', 140, 200],
	['distanceM', 50, 800],
	['ejectionFraction', 15, 75],
	['mets', 1, 10]
])('%s is asked about outside %d to %d', (field, low, high) => {
	const asked = [low - 0.1, low, high, high + 0.1].map((value) => doubtAbout(field, value) !== null);
	expect(asked).toEqual([true, false, false, true]);
});

it('asks about no field without a usual range', () => {
	expect(doubtAbout('laps', 999)).toBeNull();
});
