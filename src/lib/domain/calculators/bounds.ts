/** What can be typed into a calculator beside the readings of `bedside/bounds.ts`. Common practice, no published source. */
export const CALCULATOR_BOUNDS = {
	ageYears: { low: 16, high: 110, unit: 'years' },
	heightCm: { low: 120, high: 220, unit: 'cm' },
	weightKg: { low: 25, high: 300, unit: 'kg' },
	walkedM: { low: 0, high: 1000, unit: 'm' },
	speedMPerMin: { low: 0, high: 450, unit: 'm/min' },
	grade: { low: 0, high: 0.5, unit: 'as a fraction (0.05 is 5 %)' },
	stepsPerMin: { low: 0, high: 60, unit: 'steps/min' },
	stepHeightM: { low: 0, high: 1, unit: 'm' },
	watts: { low: 0, high: 600, unit: 'W' },
	corridorM: { low: 5, high: 200, unit: 'm' },
	laps: { low: 0, high: 200, unit: 'laps' },
	walkMinutes: { low: 0.5, high: 120, unit: 'minutes' },
	fraction: { low: 0, high: 1, unit: 'as a fraction (0.4 is 40 %)' }
} as const;
