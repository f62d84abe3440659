import { and, eq, gt, inArray } from 'drizzle-orm';
import { toRfc3339 } from '$lib/domain/core/instant';
import { localParts } from '$lib/domain/core/time';
import { rederive } from '$lib/domain/visits/series';
import { systemContext } from '../context';
import { db } from '../db';
import { visits } from '../db/schema';
import { log } from '../log';
import { write } from '../write';
import type { VisitRow } from './move';
import { patientOfEpisode } from './remind';
import { tellAnew } from './tell-patient';
import { carryReminders, replanReminders } from './waiting-reminders';

/**
 * Work out anew when the visits ahead begin, at the start: zone data come with the machine, and where a country has
 * changed its clocks meanwhile, ten o'clock as it was agreed is another instant. The wall time stays, so nobody is
 * told by text and a yes counts; reminders follow, and calendars, which hold the instant, are told.
 * @returns how many visits begin at another instant now
 */
export async function rederiveVisits(now: number): Promise<number> {
	const ahead = await db()
		.select()
		.from(visits)
		.where(and(inArray(visits.state, ['planned', 'confirmed']), gt(visits.startsAt, now)));
	const stale = ahead.filter(isStale);
	for (const visit of stale) {
		await begin(visit, now);
	}
	if (stale.length > 0) {
		log().warn({ visits: stale.length }, 'zone rules have changed');
	}
	return stale.length;
}

/**
 * Whether the clock on the wall shows another time at the instant than was agreed. A visit in an hour that happens
 * twice may begin at the second of the two, and one in a skipped hour begins after it: both are as they should be.
 */
function isStale(visit: VisitRow): boolean {
	const { date, time } = localParts(visit.startsAt, visit.zone);
	const asAgreed = date === visit.localDate && time === visit.localTime;
	return !asAgreed && rederive(visit).startsAt !== visit.startsAt;
}

async function begin(before: VisitRow, now: number): Promise<void> {
	await write(systemContext('reminders', now), 'anyone', async (tx) => {
		const visit = { ...rederive(before), sequence: before.sequence + 1 };
		const { id, episodeId, sequence } = visit;
		await tx.update(visits).set(visit).where(eq(visits.id, id));
		const patient = await patientOfEpisode(tx, episodeId);
		await carryReminders(tx, before, sequence);
		await replanReminders(tx, patient, now);
		return {
			result: null,
			audit: {
				action: 'visit.moved',
				objectKind: 'visit',
				objectId: id,
				episodeId,
				detail: {
					from: toRfc3339(before.startsAt),
					to: toRfc3339(visit.startsAt),
					sequence,
					cause: 'zone-rules'
				}
			},
			events: [{ topic: 'visit', kind: 'moved', id, episodeId }],
			messages: tellAnew(visit, patient, now)
		};
	});
}
