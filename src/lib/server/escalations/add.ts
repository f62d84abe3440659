import { and, desc, eq, inArray } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { can } from '$lib/domain/access/can';
import { GRADES, type Grade } from '$lib/domain/core/codes';
import { parseRfc3339 } from '$lib/domain/core/instant';
import { chainOf } from '$lib/domain/escalations/chain';
import { hurried } from '$lib/domain/escalations/needed-by';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { m } from '$lib/i18n/paraglide/messages';
import { loadPerson } from '../auth/people';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { escalationFacts, escalations } from '../db/schema';
import { newId } from '../ids';
import type { NewMessage } from '../outbox/enqueue';
import type { Change } from '../write';
import { entriesFor, escalationEvents } from './follow';
import { recordMove } from './moves';
import type { Raised } from './raise';
import { alert, placeOf, startChain, type EscalationRow } from './tell';

/** Does `a` ask for more haste than `b`? */
const isGraver = (a: Grade, b: Grade) => GRADES.indexOf(a) < GRADES.indexOf(b);

/**
 * The open escalation that takes a further call in: the untaken one, else a taken one that the call makes graver.
 * Null when the call is one of its own.
 */
export async function takesIn(tx: Tx, episodeId: string, grade: Grade): Promise<EscalationRow | null> {
	const open = await tx
		.select()
		.from(escalations)
		.where(and(eq(escalations.episodeId, episodeId), inArray(escalations.state, ['raised', 'taken'])))
		.orderBy(desc(escalations.raisedAt), desc(escalations.id));
	const untaken = open.find(({ state }) => state === 'raised');
	return untaken ?? open.find((row) => isGraver(grade, row.grade)) ?? null;
}

/**
 * Add a further call to an open escalation: a row of its own with all that was said. The earlier of two times
 * counts, a graver grade counts and starts the chain again, and the threads of both calls hear of it.
 */
export async function addFacts(
	tx: Tx,
	context: PersonContext,
	before: EscalationRow,
	input: RaiseInput,
	threadId: string | null
): Promise<Change<Raised>> {
	const graver = isGraver(input.grade, before.grade);
	const neededBy = input.neededBy ? parseRfc3339(input.neededBy) : null;
	const grade = graver ? input.grade : before.grade;
	const row: EscalationRow = { ...before, grade, neededBy: earlier(before.neededBy, neededBy) };
	const factId = newId();
	await tx.insert(escalationFacts).values({
		id: factId,
		escalationId: row.id,
		byId: context.actor.id,
		at: context.now,
		grade: input.grade,
		raisedGrade: graver,
		situation: input.situation,
		background: input.background,
		assessment: input.assessment,
		request: input.request,
		neededBy,
		toldInPerson: input.toldInPerson ?? null,
		sessionId: input.sessionId ?? null,
		threadId
	});
	await tx
		.update(escalations)
		.set({ grade, neededBy: row.neededBy, ...(graver ? NOBODY_ASKED : hurriedTimers(row, context.now)) })
		.where(eq(escalations.id, row.id));
	await recordMove(tx, context, row.id, 'added', { grade: input.grade, raisedGrade: graver });
	const messages = await tellOfFacts(tx, context, { ...row, ...NOBODY_ASKED }, { graver, factId, input });
	return {
		result: { id: row.id, state: heldOrNot(row), chain: chainOf(grade), bundled: true },
		audit: {
			action: 'escalation.added-to',
			objectKind: 'escalation',
			objectId: row.id,
			episodeId: row.episodeId,
			detail: { grade }
		},
		entries: await entriesFor(tx, row, 'ask', callWords(input)),
		events: await escalationEvents(tx, before, 'added-to'),
		messages
	};
}

/** An earlier time moves what is planned after it; a graver grade sets its timers anew. */
function hurriedTimers({ nextStepAt, askHolderAt, holderAskedAt, neededBy }: EscalationRow, now: number) {
	return {
		nextStepAt: nextStepAt && hurried(nextStepAt, neededBy, now),
		askHolderAt: holderAskedAt === null ? askHolderAt && hurried(askHolderAt, neededBy, now) : askHolderAt
	};
}

/** A chain that starts again asks everybody anew; whether the holder came in time for less is beside the point. */
const NOBODY_ASKED = { askHolderAt: null, holderAskedAt: null };

/** Graver facts start the chain and reach the holder; who was told in person has their one-tap answer. */
async function tellOfFacts(
	tx: Tx,
	context: PersonContext,
	row: EscalationRow,
	{ graver, factId, input }: { graver: boolean; factId: string; input: RaiseInput }
): Promise<NewMessage[]> {
	const where = await placeOf(tx, row.episodeId);
	const messages = graver ? await startChain(tx, row, 0, context.now) : [];
	const beside = await personBeside(tx, context, where.unitId, input.toldInPerson);
	const more = [beside?.id, graver ? row.takenBy : null];
	for (const userId of new Set(more)) {
		if (userId && userId !== context.actor.id && !messages.some((message) => message.userId === userId)) {
			messages.push(await alert(tx, row, userId, where, `added:${factId}`, context.now));
		}
	}
	return messages;
}

/** Whoever was told in person, when they are another than the caller and may take it on this unit. */
export async function personBeside(
	tx: Tx,
	context: PersonContext,
	unitId: string,
	userId: string | undefined
): Promise<Person | null> {
	const person = userId && userId !== context.actor.id ? await loadPerson(tx, userId) : null;
	return person && can(person, 'escalation.take', { unitId }) ? person : null;
}

const GRADE_WORDS: Record<Grade, () => string> = {
	high: m.escalations_entry_high,
	medium: m.escalations_entry_medium,
	low: m.escalations_entry_low
};

/** The line of a call in its threads. */
export function callWords({ grade, situation }: Pick<RaiseInput, 'grade' | 'situation'>): string {
	return `${GRADE_WORDS[grade]()} ${situation}`;
}

function earlier(a: number | null, b: number | null): number | null {
	return a === null || b === null ? (a ?? b) : Math.min(a, b);
}

function heldOrNot({ state }: EscalationRow): Raised['state'] {
	return state === 'taken' ? 'taken' : 'raised';
}
