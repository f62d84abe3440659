import type { ClearanceLimits } from '../domain/clearances/forms';
import { m } from './paraglide/messages';

/** The limits of a clearance in words, for threads, boards and the decider's page. */
export function limitWords(limits: ClearanceLimits | null): string[] {
	if (!limits) {
		return [];
	}
	return [
		limits.maxElevationDeg !== undefined
			? m.clearances_limit_elevation({ degrees: limits.maxElevationDeg })
			: '',
		limits.maxLoadKg !== undefined ? m.clearances_limit_load({ kg: limits.maxLoadKg }) : '',
		limits.maxMinutes !== undefined ? m.clearances_limit_minutes({ minutes: limits.maxMinutes }) : '',
		limits.helpers === 'one' ? m.clearances_limit_helper_one() : '',
		limits.helpers === 'two' ? m.clearances_limit_helper_two() : '',
		limits.text ?? ''
	].filter((part) => part !== '');
}
