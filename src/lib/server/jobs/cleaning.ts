import { endSignInsOver } from '../accounts/sign-in-ends';
import { db } from '../db';
import { forgetOldKeys } from '../idempotency';
import { forgetOldEvents } from '../live/log';
import { endUnentitledStreams } from '../live/stream';
import { forgetOldWords } from '../messages/forget';
import type { Job } from './clockwork';

const EVERY_MS = 10 * 60 * 1000;

let lastAt = -Infinity;

/** Remove what has outlived its use: old keys, old live events, what old messages said. Counts as no work done. */
export const cleaning: Job = {
	name: 'cleaning',
	async run(now) {
		if (now - lastAt < EVERY_MS) {
			return 0;
		}
		lastAt = now;
		await forgetOldKeys(db(), now);
		await forgetOldEvents(db(), now);
		await forgetOldWords(now);
		return 0;
	}
};

/** End the sign-ins whose shift is over, and the streams that they opened, without waiting for a heartbeat. */
export const signInEnds: Job = {
	name: 'sign-in ends',
	async run(now) {
		const ended = await endSignInsOver(now);
		if (ended > 0) {
			await endUnentitledStreams();
		}
		return ended;
	}
};
