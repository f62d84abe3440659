/**
 * What can be typed. Outside the hard bounds a value is refused, because no living patient has it and it is a
 * slip of the finger; outside the confirm range the page asks once more and the value is then accepted. Neither
 * is a clinical limit: those are in `limits/`. Plausible bounds: common practice, no published source.
 */
export interface Bound {
	/** What the field is called in an error message. */
	readonly name: string;
	readonly low: number;
	readonly high: number;
	readonly unit: string;
	/** The page asks again outside this range; null where it never asks. */
	readonly confirm: readonly [low: number, high: number] | null;
}

export const BOUNDS = {
	hr: { name: 'heart rate', low: 20, high: 250, unit: 'beats/min', confirm: [40, 150] },
	sbp: { name: 'systolic pressure', low: 50, high: 280, unit: 'mmHg', confirm: [80, 200] },
	dbp: { name: 'diastolic pressure', low: 20, high: 180, unit: 'mmHg', confirm: [40, 120] },
	spo2: { name: 'oxygen saturation', low: 50, high: 100, unit: '%', confirm: [85, 100] },
	rr: { name: 'breathing rate', low: 4, high: 60, unit: 'breaths/min', confirm: [8, 35] },
	rpe: { name: 'exertion', low: 6, high: 20, unit: 'on the Borg scale', confirm: null },
	pain: { name: 'pain', low: 0, high: 10, unit: '', confirm: null },
	oxygenLpm: { name: 'oxygen flow', low: 0, high: 80, unit: 'L/min', confirm: [0, 15] },
	temperature: { name: 'temperature', low: 30, high: 43, unit: '°C', confirm: [34, 40] },
	elevationDeg: { name: 'arm elevation', low: 0, high: 180, unit: 'degrees', confirm: null },
	loadKg: { name: 'load', low: 0, high: 100, unit: 'kg', confirm: [0, 20] },
	minutes: { name: 'minutes', low: 0, high: 240, unit: 'min', confirm: [0, 60] },
	repetitions: { name: 'repetitions', low: 0, high: 500, unit: 'times', confirm: [0, 60] },
	distanceM: { name: 'distance', low: 0, high: 20_000, unit: 'm', confirm: [0, 2000] },
	balls: { name: 'balls', low: 0, high: 3, unit: 'balls', confirm: null },
	steps: { name: 'steps', low: 0, high: 1000, unit: 'steps', confirm: [0, 60] },
	work: { name: 'work', low: 0, high: 10_000, unit: '', confirm: null },
	symptomGrade: { name: 'symptom grade', low: 1, high: 4, unit: '', confirm: null }
} as const satisfies Record<string, Bound>;

export type BoundedField = keyof typeof BOUNDS;

/** Pulse pressure outside this is asked about on the page, mmHg. */
export const PULSE_PRESSURE_CONFIRM = [10, 150] as const;

/** True when the page should ask 'is this right?' before it takes the value. */
export function needsConfirming(field: BoundedField, value: number): boolean {
	const range: Bound['confirm'] = BOUNDS[field].confirm;
	return range !== null && (value < range[0] || value > range[1]);
}

/** True when systolic and diastolic are both possible and yet lie unusually near together or far apart. */
export function pulsePressureNeedsConfirming(sbp: number, dbp: number): boolean {
	const [low, high] = PULSE_PRESSURE_CONFIRM;
	return sbp - dbp < low || sbp - dbp > high;
}
