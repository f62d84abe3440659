import { and, asc, eq, isNotNull, isNull, lte, or } from 'drizzle-orm';
import { GRADES } from '$lib/domain/core/codes';
import { Problem } from '$lib/domain/core/errors';
import { goOnAfterMs } from '$lib/domain/escalations/holding';
import { smsText, STAFF_NOTICES } from '$lib/domain/messages/templates';
import { m } from '$lib/i18n/paraglide/messages';
import { loadPerson } from '../auth/people';
import { systemContext, type Context } from '../context';
import { db, type Tx } from '../db';
import { escalations } from '../db/schema';
import { aroundLink } from '../links';
import type { Job } from '../jobs/clockwork';
import { write, type Change } from '../write';
import { eachById } from './chain-job';
import { entriesFor, escalationEvents } from './follow';
import { recordMove } from './moves';
import { placeOf, startChain, withLink, type EscalationRow } from './tell';

/** Asked, and nothing more has happened for the time that the holder has to answer. */
const unanswered = (now: number) =>
	and(
		eq(escalations.state, 'taken'),
		isNotNull(escalations.holderAskedAt),
		isNull(escalations.nextStepAt),
		or(
			...GRADES.map((grade) =>
				and(eq(escalations.grade, grade), lte(escalations.askHolderAt, now - goOnAfterMs(grade)))
			)
		)
	);

const unasked = (now: number) =>
	and(eq(escalations.state, 'taken'), isNull(escalations.holderAskedAt), lte(escalations.askHolderAt, now));

/**
 * An escalation does not die with its holder: who is not at the bedside in time is asked, and a while later the
 * chain goes on with the next step. They stay the holder until another takes it. The timers are rows; after a
 * stop that outlasted both, the holder is asked and the others are told in the same round.
 */
export const holderJob: Job = {
	name: 'escalation holders',
	async run(now) {
		const late = await idsOf(unasked(now));
		const asked = await eachById(late, 'asking a holder failed', (id) => each(id, now, unasked(now), ask));
		const silent = await idsOf(unanswered(now));
		const went = await eachById(silent, 'going on failed', (id) => each(id, now, unanswered(now), goOn));
		return asked + went;
	}
};

function idsOf(condition: ReturnType<typeof unasked>) {
	return db()
		.select({ id: escalations.id })
		.from(escalations)
		.where(condition)
		.orderBy(asc(escalations.askHolderAt));
}

type Deed = (tx: Tx, context: Context, row: EscalationRow) => Promise<Change<null>>;

/** Do it in one transaction, unless the holder was faster. */
async function each(id: string, now: number, condition: ReturnType<typeof unasked>, deed: Deed) {
	const context = systemContext('chain', now);
	await write(context, 'anyone', async (tx): Promise<Change<null>> => {
		const [row] = await tx
			.select()
			.from(escalations)
			.where(and(eq(escalations.id, id), condition));
		if (!row) {
			throw new Problem('wrong-state', 'The holder was faster.');
		}
		return deed(tx, context, row);
	});
}

async function ask(tx: Tx, context: Context, row: EscalationRow): Promise<Change<null>> {
	const { now } = context;
	await tx.update(escalations).set({ holderAskedAt: now }).where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'asked', { to: row.takenBy });
	const { unit, bed } = await placeOf(tx, row.episodeId);
	const body = aroundLink((link) => smsText('holder-asked', { unit, bed, grade: row.grade, link }));
	const notice = STAFF_NOTICES['holder-asked'].en({ unit, bed, grade: row.grade });
	return {
		result: null,
		audit: audited('escalation.holder-asked', row.id, row.episodeId),
		events: await escalationEvents(tx, row, 'asked'),
		messages:
			row.takenBy === null ? [] : [await withLink(tx, row, row.takenBy, { body, notice }, `ask:${now}`, now)]
	};
}

async function goOn(tx: Tx, context: Context, row: EscalationRow): Promise<Change<null>> {
	await recordMove(tx, context, row.id, 'went-on', { to: row.takenBy });
	const messages = await startChain(tx, row, row.nextStep ?? 0, context.now);
	const holder = row.takenBy === null ? null : await loadPerson(tx, row.takenBy);
	const words = m.escalations_entry_went_on({ name: holder?.name ?? '' });
	return {
		result: null,
		audit: audited('escalation.went-on', row.id, row.episodeId),
		entries: await entriesFor(tx, row, 'event', words, { strand: 'nursing' }),
		events: await escalationEvents(tx, row, 'went-on'),
		messages
	};
}

function audited(
	action: 'escalation.holder-asked' | 'escalation.went-on',
	objectId: string,
	episodeId: string
) {
	return { action, objectKind: 'escalation', objectId, episodeId } as const;
}
