import { removeEndedSignIns } from '../auth/sign-ins';
import { db } from '../db';
import { forgetOldKeys } from '../idempotency';
import { forgetOldEvents } from '../live/log';
import type { Job } from './clockwork';

const EVERY_MS = 10 * 60 * 1000;

let lastAt = -Infinity;

/** Remove what has outlived its use: ended sign-ins, old keys, old live events. Counts as no work done. */
export const cleaning: Job = {
	name: 'cleaning',
	async run(now) {
		if (now - lastAt < EVERY_MS) {
			return 0;
		}
		lastAt = now;
		await removeEndedSignIns(now);
		await forgetOldKeys(db(), now);
		await forgetOldEvents(db(), now);
		return 0;
	}
};
