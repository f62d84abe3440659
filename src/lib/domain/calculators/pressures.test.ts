import { expect, it } from 'vitest';
import { pressures } from './pressures';

/** Computed; 120/80 with a mean of 93.3 also stands in WikiLectures, Mean arterial pressure. */
it.each([
	[70, 120, 80, 93.33, 40, 8400, 0.583],
	[72, 118, 62, 80.67, 56, 8496, 0.61],
	[72, 130, 85, 100, 45, 9360, 0.554],
	[110, 90, 50, 63.33, 40, 9900, 1.222],
	[110, 150, 70, 96.67, 80, 16500, 0.733],
	[130, 200, 100, 133.33, 100, 26000, 0.65]
])('%d beats, %d/%d', (hr, sbp, dbp, map, pulsePressure, ratePressureProduct, shockIndex) => {
	const found = pressures({ hr, sbp, dbp });
	expect(found.map).toBeCloseTo(map, 2);
	expect(found.shockIndex).toBeCloseTo(shockIndex, 3);
	expect(found).toMatchObject({ pulsePressure, ratePressureProduct });
});
