import { and, asc, eq, inArray, lt } from 'drizzle-orm';
import { ENDING_STATES, stateOn } from '$lib/domain/clearances/states';
import { localDateOf } from '$lib/domain/core/time';
import { owedBy } from '$lib/domain/loose-ends/owed-by';
import { systemContext, type Context } from '../context';
import { db, type Tx } from '../db';
import { clearances } from '../db/schema';
import { env } from '../env';
import type { Job } from '../jobs/clockwork';
import { log } from '../log';
import { write, type Change } from '../write';
import { recordClearanceMove } from './moves';
import { lapsedText } from './texts';

type ClearanceRow = typeof clearances.$inferSelect;

/** Why it lapsed: its last day is past, or a later operation has made it void. */
export type LapseCause = 'end' | 'earlier-operation';

/** The day of the hospital's calendar, by which clearances end. */
export function hospitalToday(now: number): string {
	return localDateOf(now, env().hospital.zone);
}

/** Write down that a clearance has lapsed, and answer what follows: who sees it must hear of it, and it is on record. */
export async function lapse(
	tx: Tx,
	context: Context,
	{ id, episodeId, threadId, kind, state, reviewOn }: ClearanceRow,
	cause: LapseCause
): Promise<Change<null>> {
	await tx.update(clearances).set({ state: 'lapsed' }).where(eq(clearances.id, id));
	await recordClearanceMove(tx, context, { clearanceId: id, fromState: state, toState: 'lapsed' });
	const body = lapsedText(kind, cause === 'end' ? reviewOn : null);
	const strand = owedBy({ kind: 'clearance', code: kind });
	return {
		result: null,
		audit: {
			action: 'clearance.lapsed',
			objectKind: 'clearance',
			objectId: id,
			episodeId,
			detail: { kind, from: state, cause }
		},
		entries: threadId ? [{ threadId, kind: 'event', body, strand, ref: { kind: 'clearance', id } }] : [],
		events: [{ topic: 'clearance', kind: 'lapsed', id, episodeId }]
	};
}

/** Clearances lapse by themselves when the hospital's midnight after their last day has come. */
export const lapseJob: Job = {
	name: 'clearance lapses',
	async run(now) {
		const due = await db()
			.select({ id: clearances.id })
			.from(clearances)
			.where(and(inArray(clearances.state, [...ENDING_STATES]), lt(clearances.reviewOn, hospitalToday(now))))
			.orderBy(asc(clearances.reviewOn), asc(clearances.id));
		let done = 0;
		for (const { id } of due) {
			// One that fails must not keep the others; readers see it as lapsed meanwhile, and the next beat tries again.
			done += await lapseDue(id, now).catch((error: unknown) => {
				log().error({ id, err: error }, 'lapse failed');
				return 0;
			});
		}
		return done;
	}
};

/** Thrown to leave the transaction empty when somebody changed the clearance since it was found due. */
class NotDue extends Error {}

async function lapseDue(id: string, now: number): Promise<number> {
	const context = systemContext('lapses', now);
	try {
		await write(context, 'anyone', async (tx) => {
			const [row] = await tx.select().from(clearances).where(eq(clearances.id, id));
			if (!row || row.state === 'lapsed' || stateOn(row, hospitalToday(now)) !== 'lapsed') {
				throw new NotDue();
			}
			return lapse(tx, context, row, 'end');
		});
		return 1;
	} catch (error) {
		if (error instanceof NotDue) {
			return 0;
		}
		throw error;
	}
}
