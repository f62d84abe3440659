import type { ActivityDone, Reading } from '$lib/domain/bedside/forms';

/** A reading in the order in which it is called out: pulse, pressure, saturation; then what else was noted. */
export function reading(hr: number, sbp: number, dbp: number, spo2: number, more: Reading = {}): Reading {
	return { hr, sbp, dbp, spo2, posture: 'sitting', bpSource: 'cuff', ...more };
}

/** What was done, by codes; details where they matter. */
export function done(...activities: (ActivityDone['code'] | ActivityDone)[]): ActivityDone[] {
	return activities.map((one) => (typeof one === 'string' ? { code: one } : one));
}
