import { and, eq } from 'drizzle-orm';
import { GRADES, type Grade } from '$lib/domain/core/codes';
import { invalidField } from '$lib/domain/core/errors';
import { parseRfc3339 } from '$lib/domain/core/instant';
import { chainOf, chainStep, type ChainStep } from '$lib/domain/escalations/chain';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode, threadForDeed } from '../access/access';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { bedsideSessions, escalations, users } from '../db/schema';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';
import { recordMove } from './moves';
import { freeReplyCode } from './reply-code';
import { tellFrom, type EscalationRow } from './tell';

export interface Raised {
	id: string;
	state: 'raised';
	chain: ChainStep[];
	/** Set when an untaken one of the same patient took the new facts in. */
	bundled?: true;
}

/**
 * Call for help about a patient. The first step of the chain is told in the same transaction, so that a raised
 * escalation always has its messages. An untaken one of the same patient takes the new facts in; when they are
 * graver its grade rises and its chain starts again.
 */
export function raiseEscalation(
	context: PersonContext,
	episodeId: string,
	input: RaiseInput
): Promise<Written<Raised>> {
	return write(context, 'escalation.raise', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'escalation.raise');
		await checkReferences(tx, episodeId, input);
		const threadId = await threadForDeed(tx, episodeId, input.threadId);
		const [untaken] = await tx
			.select()
			.from(escalations)
			.where(and(eq(escalations.episodeId, episodeId), eq(escalations.state, 'raised')));
		return untaken
			? addFacts(tx, context, untaken, input)
			: raiseNew(tx, context, { episodeId, unitId: episode.unitId, threadId }, input);
	});
}

async function raiseNew(
	tx: Tx,
	context: PersonContext,
	about: { episodeId: string; unitId: string; threadId: string | null },
	input: RaiseInput
): Promise<Change<Raised>> {
	const row: EscalationRow = {
		...EMPTY,
		...about,
		id: newId(),
		grade: input.grade,
		state: 'raised',
		situation: input.situation,
		background: input.background,
		assessment: input.assessment,
		request: input.request,
		neededBy: input.neededBy ? parseRfc3339(input.neededBy) : null,
		toldInPerson: input.toldInPerson ?? null,
		sessionId: input.sessionId ?? null,
		raisedBy: context.actor.id,
		raisedAt: context.now,
		replyCode: await freeReplyCode(tx, context.now),
		chainStartedAt: context.now
	};
	await tx.insert(escalations).values(row);
	await recordMove(tx, context, row.id, 'raised', { grade: row.grade });
	const messages = await startChain(tx, row, context.now);
	return {
		result: { id: row.id, state: 'raised', chain: chainOf(row.grade) },
		audit: audited('escalation.raised', row),
		entries: entriesFor(row, input),
		events: [{ topic: 'escalation', kind: 'raised', id: row.id, episodeId: row.episodeId }],
		messages
	};
}

async function addFacts(
	tx: Tx,
	context: PersonContext,
	untaken: EscalationRow,
	input: RaiseInput
): Promise<Change<Raised>> {
	const worse = GRADES.indexOf(input.grade) < GRADES.indexOf(untaken.grade);
	const row: EscalationRow = {
		...untaken,
		grade: worse ? input.grade : untaken.grade,
		situation: joined(untaken.situation, input.situation),
		assessment: joined(untaken.assessment, input.assessment),
		request: joined(untaken.request, input.request),
		sessionId: input.sessionId ?? untaken.sessionId,
		chainStartedAt: worse ? context.now : untaken.chainStartedAt
	};
	await tx.update(escalations).set(row).where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'added', { grade: input.grade, raisedGrade: worse });
	return {
		result: { id: row.id, state: 'raised', chain: chainOf(row.grade), bundled: true },
		audit: audited('escalation.added-to', row),
		entries: entriesFor(row, input),
		events: [{ topic: 'escalation', kind: 'added-to', id: row.id, episodeId: row.episodeId }],
		messages: worse ? await startChain(tx, row, context.now) : []
	};
}

/** Tell the first step now and set the timer of the next. */
export async function startChain(tx: Tx, row: EscalationRow, now: number) {
	const { messages, lastStep } = await tellFrom(tx, row, 0, now);
	const nextStep = lastStep + 1;
	const nextStepAt = row.chainStartedAt + chainStep(row.grade, nextStep).afterSeconds * 1000;
	await tx.update(escalations).set({ nextStep, nextStepAt }).where(eq(escalations.id, row.id));
	return messages;
}

async function checkReferences(tx: Tx, episodeId: string, input: RaiseInput): Promise<void> {
	if (input.sessionId) {
		const [session] = await tx
			.select({ id: bedsideSessions.id })
			.from(bedsideSessions)
			.where(and(eq(bedsideSessions.id, input.sessionId), eq(bedsideSessions.episodeId, episodeId)));
		if (!session) {
			throw invalidField('/sessionId', `sessionId ${input.sessionId} is no session of this patient.`);
		}
	}
	if (input.toldInPerson) {
		const [told] = await tx.select({ id: users.id }).from(users).where(eq(users.id, input.toldInPerson));
		if (!told) {
			throw invalidField('/toldInPerson', `toldInPerson ${input.toldInPerson} is nobody we know.`);
		}
	}
}

/** New facts stand below the old ones; the same sentence is not repeated. */
function joined(before: string, added: string): string {
	return before.split('\n').includes(added) ? before : `${before}\n${added}`;
}

function audited(action: 'escalation.raised' | 'escalation.added-to', row: EscalationRow) {
	const detail = { grade: row.grade };
	return { action, objectKind: 'escalation', objectId: row.id, episodeId: row.episodeId, detail } as const;
}

const GRADE_WORDS: Record<Grade, () => string> = {
	high: m.escalations_entry_high,
	medium: m.escalations_entry_medium,
	low: m.escalations_entry_low
};

function entriesFor(row: EscalationRow, input: RaiseInput) {
	if (!row.threadId) {
		return [];
	}
	const body = `${GRADE_WORDS[input.grade]()} ${input.situation}`;
	return [
		{ threadId: row.threadId, kind: 'ask' as const, body, ref: { kind: 'escalation' as const, id: row.id } }
	];
}

/** What a new escalation does not have yet. */
const EMPTY = {
	takenBy: null,
	takenAt: null,
	etaMinutes: null,
	arrivedAt: null,
	passTo: null,
	passReason: null,
	endedBy: null,
	endedAt: null,
	outcome: null,
	note: null,
	informed: null,
	recheckDueAt: null,
	recheckDoneAt: null,
	nextStep: null,
	nextStepAt: null
};
