import { db } from '../../db';
import { and, eq, lte } from 'drizzle-orm';
import type { Instant } from '$lib/domain/core/time';
import { systemContext } from '../../context';
import { outbox } from '../../db/schema';
import { env } from '../../env';
import { write } from '../../write';
import { markLoaded } from '../mark';
import { Calendar } from './calendar';
import { foundHospital, type Found } from './found';
import { PATIENTS, type PatientKey } from './patients';
import { harrow, pell, vantry } from './stories/heron';
import { ferrow, mallin, oakes, thorne } from './stories/gym';
import { brackwater, reeve, sorrel } from './stories/tern-arm-stage';
import { aske, dunmore } from './stories/tern-early';
import { carrow, lune } from './stories/tern-late';
import { Telling, type Deed } from './telling';

const STORIES: Record<PatientKey, (t: Telling) => void> = {
	harrow,
	pell,
	vantry,
	aske,
	dunmore,
	reeve,
	sorrel,
	brackwater,
	lune,
	carrow,
	thorne,
	ferrow,
	mallin,
	oakes
};

const DAYS_BEFORE_STORIES = 80;

/**
 * Make the demonstration hospital in a fresh database: found it, then do every deed of every story through the
 * actions that people use, in the order of time and with the clock of the deed. Afterwards nothing old is left to
 * be sent; reminders of visits ahead stay as they are.
 * @param start what everything is dated relative to, milliseconds UTC
 */
export async function loadDemonstration(start: Instant): Promise<void> {
	const calendar = new Calendar(start, env().hospital.zone);
	const found = await foundHospital(calendar, calendar.on(DAYS_BEFORE_STORIES, '09:00'));
	for (const { at, run } of deedsInOrder(found, calendar)) {
		await countAsSent(at);
		await run();
	}
	await countAsSent(start);
	await write(systemContext('demonstration', start), 'anyone', async (tx) => {
		await markLoaded(tx, start);
		return {
			result: null,
			audit: { action: 'demonstration.loaded', objectKind: 'hospital', objectId: 'demonstration' }
		};
	});
}

function deedsInOrder(found: Found, calendar: Calendar): Deed[] {
	const keys = Object.keys(STORIES) as PatientKey[];
	const deeds = keys.flatMap((key) => {
		const telling = new Telling(PATIENTS[key], calendar, found);
		STORIES[key](telling);
		return telling.deeds;
	});
	// What happens in the same instant stays in the order in which it was told.
	return deeds.sort((a, b) => a.at - b.at);
}

/** Messages of the past went out when they were due; nobody must get them now. */
async function countAsSent(now: Instant): Promise<void> {
	const due = and(eq(outbox.state, 'ready'), lte(outbox.nextAt, now));
	if ((await db().$count(outbox, due)) === 0) {
		return;
	}
	await db()
		.update(outbox)
		.set({ state: 'accepted', stateReason: 'demonstration', sentAt: outbox.nextAt })
		.where(due);
}
