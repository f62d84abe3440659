import { and, asc, eq, lte } from 'drizzle-orm';
import { dueSteps } from '$lib/domain/escalations/chain';
import { systemContext } from '../context';
import { db, type Tx } from '../db';
import { escalations } from '../db/schema';
import type { Job } from '../jobs/clockwork';
import type { NewMessage } from '../outbox/enqueue';
import { log } from '../log';
import { write } from '../write';
import { tellStep } from './tell';

/** Until somebody takes it the chain goes on. The timers are rows, so a restart resumes them where they were. */
export const chainJob: Job = {
	name: 'escalation chain',
	async run(now) {
		const due = await db()
			.select({ id: escalations.id })
			.from(escalations)
			.where(and(eq(escalations.state, 'raised'), lte(escalations.nextStepAt, now)))
			.orderBy(asc(escalations.nextStepAt));
		for (const { id } of due) {
			// One that fails must not keep the others from being told; it is tried again at the next beat.
			await tellDue(id, now).catch((error: unknown) => log().error({ id, err: error }, 'chain step failed'));
		}
		return due.length;
	}
};

async function tellDue(id: string, now: number): Promise<void> {
	await write(systemContext('chain', now), 'anyone', async (tx) => {
		const messages = await advance(tx, id, now);
		const [row] = await tx.select().from(escalations).where(eq(escalations.id, id));
		const episodeId = row?.episodeId ?? null;
		return {
			result: null,
			audit: {
				action: 'escalation.chain-step',
				objectKind: 'escalation',
				objectId: id,
				episodeId,
				detail: { told: messages.length, nextStep: row?.nextStep ?? null }
			},
			events: [{ topic: 'escalation', kind: 'told', id, episodeId }],
			messages
		};
	});
}

/** Tell every step that is due and move the timer; nothing when somebody took it meanwhile. */
async function advance(tx: Tx, id: string, now: number): Promise<NewMessage[]> {
	const [row] = await tx
		.select()
		.from(escalations)
		.where(and(eq(escalations.id, id), eq(escalations.state, 'raised')));
	if (!row || row.nextStep === null) {
		return [];
	}
	const { due, nextStep, nextAt } = dueSteps(row.grade, row.chainStartedAt, row.nextStep, now);
	const messages: NewMessage[] = [];
	for (const step of due) {
		messages.push(...(await tellStep(tx, row, step, now)));
	}
	await tx.update(escalations).set({ nextStep, nextStepAt: nextAt }).where(eq(escalations.id, id));
	return messages;
}
