import { and, asc, eq, isNull } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { nextClearanceState, stateOn } from '$lib/domain/clearances/states';
import type { ClearanceQuestion } from '$lib/domain/clearances/views';
import { Problem } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { CLEARANCE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';
import { accessClearance } from '../access/access';
import type { PersonContext } from '../context';
import type { Reader, Tx } from '../db';
import { clearanceQuestions, users, type clearances } from '../db/schema';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';
import { hospitalToday } from './lapse';

type ClearanceRow = typeof clearances.$inferSelect;

/**
 * Ask back instead of deciding: the ask stays open, and whoever made it owes an answer.
 * @throws Problem `wrong-state` once it is decided; `already-asked` while another question waits
 */
export function askBack(
	context: PersonContext,
	id: string,
	question: string
): Promise<Written<{ id: string; state: 'asked'; questionId: string }>> {
	return write(context, 'clearance.decide', async (tx) => {
		const { clearance } = await accessClearance(tx, context.actor, id, 'clearance.decide');
		nextClearanceState(stateOn(clearance, hospitalToday(context.now)), 'ask-back');
		const waiting = await openQuestion(tx, id);
		if (waiting) {
			throw new Problem('already-asked', 'A question about this ask waits for its answer already.', {
				question: waiting.question
			});
		}
		const questionId = newId();
		await tx.insert(clearanceQuestions).values({
			id: questionId,
			clearanceId: id,
			question,
			askedBy: context.actor.id,
			askedAt: context.now
		});
		const body = m.clearances_entry_asked_back({ kind: CLEARANCE_WORDS[clearance.kind](), question });
		return {
			result: { id, state: 'asked', questionId },
			...told(clearance, 'clearance.asked-back', body)
		};
	});
}

/**
 * Answer what was asked back; any colleague who may ask for clearances may do it for the one who asked.
 * @throws Problem `wrong-state` when nothing waits for an answer
 */
export function answerQuestion(
	context: PersonContext,
	id: string,
	answer: string
): Promise<Written<{ id: string; state: ClearanceRow['state'] }>> {
	return write(context, 'clearance.ask', async (tx) => {
		const { clearance } = await accessClearance(tx, context.actor, id, 'clearance.ask');
		const waiting = await openQuestion(tx, id);
		if (!waiting || clearance.state !== 'asked') {
			throw new Problem('wrong-state', 'Nothing about this ask waits for an answer.', {
				state: clearance.state
			});
		}
		await tx
			.update(clearanceQuestions)
			.set({ answer, answeredBy: context.actor.id, answeredAt: context.now })
			.where(eq(clearanceQuestions.id, waiting.id));
		const body = m.clearances_entry_answered({ kind: CLEARANCE_WORDS[clearance.kind](), answer });
		return {
			result: { id, state: clearance.state },
			...told(clearance, 'clearance.answered', body)
		};
	});
}

/** A note of the thread, not its answer: the ask itself hangs loose until it is decided. */
function told(
	{ id, episodeId, threadId, kind }: ClearanceRow,
	action: 'clearance.asked-back' | 'clearance.answered',
	body: string
): Omit<Change<never>, 'result'> {
	return {
		audit: { action, objectKind: 'clearance', objectId: id, episodeId, detail: { kind } },
		entries: threadId ? [{ threadId, kind: 'note', body, ref: { kind: 'clearance', id } }] : [],
		events: [
			{
				topic: 'clearance',
				kind: action === 'clearance.answered' ? 'answered' : 'asked-back',
				id,
				episodeId
			}
		]
	};
}

async function openQuestion(tx: Tx, clearanceId: string) {
	const [waiting] = await tx
		.select()
		.from(clearanceQuestions)
		.where(and(eq(clearanceQuestions.clearanceId, clearanceId), isNull(clearanceQuestions.answeredAt)));
	return waiting ?? null;
}

const asker = alias(users, 'question_asker');
const answerer = alias(users, 'question_answerer');

/** What was asked back about one ask, the oldest first. */
export async function questionsOf(db: Reader, clearanceId: string): Promise<ClearanceQuestion[]> {
	const rows = await db
		.select({ asked: clearanceQuestions, askedBy: asker.name, answeredBy: answerer.name })
		.from(clearanceQuestions)
		.innerJoin(asker, eq(asker.id, clearanceQuestions.askedBy))
		.leftJoin(answerer, eq(answerer.id, clearanceQuestions.answeredBy))
		.where(eq(clearanceQuestions.clearanceId, clearanceId))
		.orderBy(asc(clearanceQuestions.askedAt), asc(clearanceQuestions.id));
	return rows.map(({ asked, askedBy, answeredBy }) => ({
		id: asked.id,
		question: asked.question,
		askedBy,
		askedAt: toRfc3339(asked.askedAt),
		answer: asked.answer,
		answeredBy,
		answeredAt: asked.answeredAt === null ? null : toRfc3339(asked.answeredAt)
	}));
}
