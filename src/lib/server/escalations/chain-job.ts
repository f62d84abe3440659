import { and, asc, eq, inArray, lte } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import { dueSteps, isChainSpent } from '$lib/domain/escalations/chain';
import { systemContext } from '../context';
import { db, type Tx } from '../db';
import { escalations } from '../db/schema';
import type { Job } from '../jobs/clockwork';
import type { NewMessage } from '../outbox/enqueue';
import { log } from '../log';
import { write, type Change } from '../write';
import { escalationEvents } from './follow';
import { setTimer, tellFrom, tellStep, type EscalationRow } from './tell';

/**
 * Until somebody takes it the chain goes on, and so it does beside a holder who does not come. The timers are
 * rows, so a restart resumes them where they were.
 */
export const chainJob: Job = {
	name: 'escalation chain',
	async run(now) {
		const due = await db()
			.select({ id: escalations.id })
			.from(escalations)
			.where(and(inArray(escalations.state, ['raised', 'taken']), lte(escalations.nextStepAt, now)))
			.orderBy(asc(escalations.nextStepAt));
		return eachById(due, 'chain step failed', (id) => tellDue(id, now));
	}
};

/**
 * Do it for each. One that fails must not keep the others from being told; it is tried again at the next beat. A
 * `Problem` means that a person was faster, and nothing is to be done.
 */
export async function eachById(
	due: readonly { id: string }[],
	failure: string,
	work: (id: string) => Promise<void>
): Promise<number> {
	for (const { id } of due) {
		await work(id).catch((error: unknown) => {
			if (!(error instanceof Problem)) {
				log().error({ id, err: error }, failure);
			}
		});
	}
	return due.length;
}

async function tellDue(id: string, now: number): Promise<void> {
	await write(systemContext('chain', now), 'anyone', async (tx): Promise<Change<null>> => {
		const [row] = await tx.select().from(escalations).where(eq(escalations.id, id));
		if (!row || row.nextStep === null || row.nextStepAt === null || row.nextStepAt > now) {
			throw new Problem('wrong-state', 'Somebody was faster.');
		}
		const messages = await advance(tx, row, row.nextStep, now);
		return {
			result: null,
			audit: {
				action: 'escalation.chain-step',
				objectKind: 'escalation',
				objectId: id,
				episodeId: row.episodeId,
				detail: { told: messages.length, step: row.nextStep }
			},
			events: await escalationEvents(tx, row, 'told'),
			messages
		};
	});
}

/**
 * Tell every step from `first` on that is due, and move the timer. When those steps reach nobody, or none is due and
 * somebody is needed by now, the next one is told at once, as at the start of the chain.
 */
async function advance(tx: Tx, row: EscalationRow, first: number, now: number): Promise<NewMessage[]> {
	const { due, nextStep } = dueSteps(row.grade, row.chainStartedAt, first, now);
	const messages: NewMessage[] = [];
	for (const step of due) {
		messages.push(...(await tellStep(tx, row, step, now)));
	}
	if (messages.length > 0 || (due.length > 0 && isChainSpent(row.grade, nextStep))) {
		await setTimer(tx, row, nextStep, now);
		return messages;
	}
	const onward = await tellFrom(tx, row, nextStep, now);
	await setTimer(tx, row, onward.lastStep + 1, now);
	return onward.messages;
}
