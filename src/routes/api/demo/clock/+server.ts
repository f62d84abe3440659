import { z } from 'zod';
import { Problem } from '$lib/domain/core/errors';
import { now } from '$lib/server/clock';
import { env } from '$lib/server/env';
import { readJson } from '$lib/server/http/body';
import { answering, jsonResponse } from '$lib/server/http/endpoint';
import { invalidBody } from '$lib/server/http/problem';
import { settleWork } from '$lib/server/jobs/work';
import { moveClock } from '$lib/server/setup/moved-clock';
import type { RequestHandler } from './$types';

const YEAR_MS = 366 * 24 * 60 * 60 * 1000;

const body = z.strictObject({
	advanceMs: z
		.number('advanceMs is a number of milliseconds.')
		.int('advanceMs is a whole number.')
		.min(0, 'advanceMs is at least 0: time never goes back.')
		.max(YEAR_MS, `advanceMs is at most ${YEAR_MS}, a year.`)
});

/** Move the clock of a demonstration and do all work that is due by then. It exists only with DEMO=1 and TEST_CLOCK=1. */
export const PUT: RequestHandler = ({ request }) =>
	answering(async () => {
		if (!env().testClock) {
			throw new Problem('not-found', 'There is no /api/demo/clock.');
		}
		const parsed = body.safeParse(await readJson(request));
		if (!parsed.success) {
			throw invalidBody(parsed.error);
		}
		await moveClock(parsed.data.advanceMs);
		await settleWork();
		return jsonResponse(200, { now: new Date(now()).toISOString() });
	});
