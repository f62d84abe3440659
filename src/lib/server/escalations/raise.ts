import { and, eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { invalidField } from '$lib/domain/core/errors';
import { parseRfc3339 } from '$lib/domain/core/instant';
import { chainOf, IN_PERSON_MS, type ChainStep } from '$lib/domain/escalations/chain';
import type { RaiseInput } from '$lib/domain/escalations/forms';
import { accessEpisode } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { bedsideSessions, escalations, users } from '../db/schema';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';
import { addFacts, callWords, personBeside, takesIn } from './add';
import { entriesFor, escalationEvents } from './follow';
import { recordMove } from './moves';
import { freeReplyCode } from './reply-code';
import { alert, placeOf, setTimer, startChain, type EscalationRow } from './tell';

export interface Raised {
	id: string;
	/** `taken` when graver facts were added to one that somebody has. */
	state: 'raised' | 'taken';
	chain: ChainStep[];
	/** Set when an open one of the same patient took the new facts in. */
	bundled?: true;
}

/**
 * Call for help about a patient. The first step of the chain is told in the same transaction, so that a raised
 * escalation always has its messages. One that is open already takes the new facts in: an untaken one always, a
 * taken one when they are graver; its grade then rises and its chain starts again.
 */
export function raiseEscalation(
	context: PersonContext,
	episodeId: string,
	input: RaiseInput
): Promise<Written<Raised>> {
	return write(context, 'escalation.raise', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'escalation.raise');
		await checkReferences(tx, episodeId, input);
		const threadId = await threadForDeed(tx, episodeId, context.actor, input.threadId);
		const open = await takesIn(tx, episodeId, input.grade);
		return open
			? addFacts(tx, context, open, input, threadId)
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
	const beside = await personBeside(tx, context, about.unitId, input.toldInPerson);
	const messages = beside
		? await waitForNamed(tx, context, row, beside)
		: await startChain(tx, row, 0, context.now);
	return {
		result: { id: row.id, state: 'raised', chain: chainOf(row.grade, beside ? IN_PERSON_MS : 0) },
		audit: audited('escalation.raised', row),
		entries: await entriesFor(tx, row, 'ask', callWords(input)),
		events: await escalationEvents(tx, row, 'raised'),
		messages
	};
}

/** Told in person counts: the named one has two minutes to say so, and the chain starts only without it. */
async function waitForNamed(tx: Tx, context: PersonContext, row: EscalationRow, named: Person) {
	await recordMove(tx, context, row.id, 'told-in-person', { to: named.id });
	await setTimer(tx, { ...row, chainStartedAt: context.now + IN_PERSON_MS }, 0, context.now);
	const where = await placeOf(tx, row.episodeId);
	return [await alert(tx, row, named.id, where, 'in-person', context.now)];
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

function audited(action: 'escalation.raised', row: EscalationRow) {
	const detail = { grade: row.grade };
	return { action, objectKind: 'escalation', objectId: row.id, episodeId: row.episodeId, detail } as const;
}

/** What a new escalation does not have yet. */
const EMPTY = {
	takenBy: null,
	takenAt: null,
	etaMinutes: null,
	etaGivenAt: null,
	askHolderAt: null,
	holderAskedAt: null,
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
