import { sessionBody, type SessionBody } from '$lib/domain/bedside/forms';

/** A session whose systolic pressure falls by `fall` from 130 mmHg; it ended at this instant and took ten minutes. */
export function sessionFalling(fall: number, endedAt: number): SessionBody {
	const calm = { hr: 78, dbp: 72, spo2: 97, rr: 16, pain: 1 };
	return sessionBody.parse({
		context: { betaBlocked: false, rhythm: 'sinus', sternotomy: true, level: 2, conscious: true },
		before: { ...calm, sbp: 130 },
		during: [],
		after: { ...calm, sbp: 130 - fall },
		level: 2,
		startedAt: new Date(endedAt - 10 * 60_000).toISOString(),
		endedAt: new Date(endedAt).toISOString()
	});
}
