/** The activities catalogue: what may be done at which level, how much, and what it must have before it. */
import type { Level } from '../../core/codes';
import type { Activity } from './activity';
import type { ActivityCode } from './codes';
import { bedActivities, breathingActivities, limbActivities } from './level-1';
import { chairActivities, roomActivities } from './level-2-3';
import { corridorActivities, gymActivities, longerActivities, stairActivities } from './level-4-6';

/** Every activity, in the order of recovery. */
export const ACTIVITIES: readonly Activity[] = [
	...limbActivities,
	...breathingActivities,
	...bedActivities,
	...chairActivities,
	...roomActivities,
	...corridorActivities,
	...longerActivities,
	...stairActivities,
	...gymActivities
];

const BY_CODE = new Map(ACTIVITIES.map((activity) => [activity.code, activity]));

/** The entry of a code. Every code has one; a test holds that, and a code without one is a fault of the catalogue. */
export function activityByCode(code: ActivityCode): Activity {
	const activity = BY_CODE.get(code);
	if (activity === undefined) {
		throw new Error(`The activities catalogue has no entry for '${code}'.`);
	}
	return activity;
}

/** What a patient who has reached this level may be offered, subject to clearances. */
export function activitiesUpTo(level: Level): Activity[] {
	return ACTIVITIES.filter((activity) => activity.level <= level);
}
