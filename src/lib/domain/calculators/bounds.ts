/**
 * What can be typed into a calculator beside the readings of `bedside/bounds.ts`; outside `confirm` the page asks once
 * more. Common practice, no published source.
 */
export const CALCULATOR_BOUNDS = {
	ageYears: { low: 16, high: 110, unit: 'years', confirm: [18, 95] },
	heightCm: { low: 120, high: 220, unit: 'cm', confirm: [140, 200] },
	weightKg: { low: 25, high: 300, unit: 'kg', confirm: [40, 180] },
	walkedM: { low: 0, high: 1000, unit: 'm', confirm: [50, 800] },
	speedMPerMin: { low: 0, high: 450, unit: 'm/min' },
	grade: { low: 0, high: 0.5, unit: 'as a fraction (0.05 is 5 %)' },
	stepsPerMin: { low: 0, high: 60, unit: 'steps/min' },
	stepHeightM: { low: 0, high: 1, unit: 'm' },
	watts: { low: 0, high: 600, unit: 'W' },
	corridorM: { low: 5, high: 200, unit: 'm' },
	laps: { low: 0, high: 200, unit: 'laps' },
	walkMinutes: { low: 0.5, high: 120, unit: 'minutes' },
	ejectionFraction: { low: 5, high: 85, unit: '%', confirm: [15, 75] },
	mets: { low: 0.8, high: 20, unit: 'METs', confirm: [1, 10] },
	holdSeconds: { low: 0.5, high: 20, unit: 's' },
	breathsAnHour: { low: 0, high: 200, unit: 'breaths' },
	vitalCapacityMl: { low: 100, high: 8000, unit: 'mL' },
	fraction: { low: 0, high: 1, unit: 'as a fraction (0.4 is 40 %)' }
} as const;
