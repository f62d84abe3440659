import { eq } from 'drizzle-orm';
import { advanceClock, movedBy, now, stopClockAt } from '../clock';
import { db } from '../db';
import { settings } from '../db/schema';

const KEY = 'moved-clock';

/** Move the demonstration's clock forward, for good: time does not go back when the server is started again. */
export async function moveClock(byMs: number): Promise<void> {
	advanceClock(byMs);
	const row = { value: movedBy(), changedAt: now() };
	await db()
		.insert(settings)
		.values({ key: KEY, ...row })
		.onConflictDoUpdate({ target: settings.key, set: row });
}

/**
 * Take up the clock where the process before left it; called once, before anything asks for the time.
 * @param at where it stands still, milliseconds UTC; null where it goes
 */
export async function takeUpClock(at: number | null): Promise<void> {
	if (at !== null) {
		stopClockAt(at);
	}
	const [row] = await db().select().from(settings).where(eq(settings.key, KEY));
	if (typeof row?.value === 'number') {
		advanceClock(row.value);
	}
}
