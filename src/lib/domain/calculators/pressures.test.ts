import { expect, it } from 'vitest';
import { pressures, productBand } from './pressures';

/** Computed from the published formulas; 120/80 with a mean of 93.3 also stands in WikiLectures, Mean arterial pressure. */
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

// Bands: Rate pressure product, Wikipedia, secondary.
it.each([
	[8400, null],
	[9999, null],
	[10_000, 'low'],
	[14_999, 'low'],
	[15_000, 'low-intermediate'],
	[16_500, 'low-intermediate'],
	[20_000, 'intermediate'],
	[25_000, 'high-intermediate'],
	[26_000, 'high-intermediate'],
	[29_999, 'high-intermediate'],
	[30_000, 'high']
])('a rate-pressure product of %d is %s', (product, band) => {
	expect(productBand(product)).toBe(band);
});
