import { and, eq, isNotNull, isNull } from 'drizzle-orm';
import { activityByCode } from '$lib/domain/bedside/activities/activities';
import { assess } from '$lib/domain/bedside/assess';
import type { Verdict } from '$lib/domain/bedside/finding';
import type { Assessment, Reading, SessionBody } from '$lib/domain/bedside/forms';
import { limitsOfPatient, setOfUnit } from '$lib/domain/bedside/limits/layers';
import type { LimitSet } from '$lib/domain/bedside/limits/limits';
import { lackingClearance } from '$lib/domain/bedside/rules/clearances';
import type { ClearanceKind } from '$lib/domain/core/codes';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { parseRfc3339 } from '$lib/domain/core/instant';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode, threadForDeed, type EpisodeRow } from '../access/access';
import { insertAsk, openOrInForce } from '../clearances/ask';
import type { PersonContext } from '../context';
import type { Tx } from '../db';
import { bedsideSessions, episodes, escalations, findings, readings } from '../db/schema';
import { factsOfOne, type EpisodeFacts } from '../episodes/facts';
import { newId } from '../ids';
import { askForSignature } from '../levels/sign-off';
import { layersOf } from '../limits/queries';
import { write, type Change, type Written } from '../write';
import { summaryText } from './summary';

/** A clock of a phone may run ahead of the server's by this much. */
const FUTURE_MS = 5 * 60 * 1000;

/**
 * Record one bedside treatment, judged by the same function as the page and by the clearances on record.
 * @throws Problem `clearance-needed` when something was done whose clearance is not in force, unless it comes
 * with a deviation: what happened is never refused a place in the record
 */
export function recordSession(
	context: PersonContext,
	episodeId: string,
	input: SessionBody
): Promise<Written<{ id: string; findings: Verdict['findings']; outcome: Verdict['outcome'] }>> {
	return write(context, 'session.record', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'session.record');
		refuseFuture(input, context.now);
		const facts = await factsOfOne(tx, episode, context.now);
		const judged = withRecord(input, episode, facts);
		const missing = missingClearances(judged);
		if (missing.length > 0 && !input.deviation) {
			throw new Problem('clearance-needed', `Not cleared: ${missing.join(', ')}.`, { needed: missing });
		}
		const verdict = assess(judged, await limitsThatJudge(tx, episode, judged.context, input));
		const id = newId();
		await insertSession(tx, context, id, episode, facts, { ...input, context: judged.context }, verdict);
		await updateEpisode(tx, context, episode, input, verdict);
		await askForSignature(tx, context, episode, id, input);
		const asks = await askForDeviations(tx, context, episode, facts, missing, input);
		return consequences(tx, episode, id, input, verdict, asks);
	});
}

/** Clearances and limits on record count, not those that the client believes in. */
function withRecord(input: SessionBody, episode: EpisodeRow, facts: EpisodeFacts): Assessment {
	const clearances = facts.newest.map((row) => ({
		kind: row.kind,
		state: row.state,
		maxElevationDeg: row.limits?.maxElevationDeg ?? null,
		maxLoadKg: row.limits?.maxLoadKg ?? null
	}));
	const sternotomy = facts.operation ? facts.precautions.sternal : input.context.sternotomy;
	const { limits: _believed, ...context } = input.context;
	const phase = context.phase ?? episode.phase;
	return { ...input, context: { ...context, phase, sternotomy, clearances, level: input.level } };
}

/** The limits of unit and patient that held when the session ended, also where it is entered afterwards. */
async function limitsThatJudge(
	tx: Tx,
	episode: EpisodeRow,
	{ set, phase }: Assessment['context'],
	{ endedAt }: SessionBody
): Promise<LimitSet> {
	const layers = await layersOf(tx, episode, parseRfc3339(endedAt));
	return limitsOfPatient(set ?? setOfUnit(layers.unit, phase ?? episode.phase), layers);
}

function missingClearances(judged: Assessment): ClearanceKind[] {
	const lacking = judged.activities
		.filter((done) => !done.notDone)
		.map((done) => lackingClearance(judged.context, activityByCode(done.code)))
		.filter((kind) => kind !== null);
	return [...new Set(lacking)];
}

function refuseFuture(input: SessionBody, now: number): void {
	if (parseRfc3339(input.startedAt) > now + FUTURE_MS) {
		throw invalidField('/startedAt', `startedAt ${input.startedAt} lies in the future.`);
	}
}

async function insertSession(
	tx: Tx,
	context: PersonContext,
	id: string,
	episode: EpisodeRow,
	facts: EpisodeFacts,
	input: SessionBody,
	verdict: Verdict
): Promise<void> {
	await tx.insert(bedsideSessions).values({
		id,
		episodeId: episode.id,
		operationId: facts.operation?.id ?? null,
		startedAt: parseRfc3339(input.startedAt),
		endedAt: parseRfc3339(input.endedAt),
		level: input.level,
		context: { ...input.context },
		symptoms: input.symptoms,
		activities: input.activities,
		outcome: verdict.outcome,
		notJudged: [...verdict.notJudged],
		limitSet: verdict.set,
		limitVersion: verdict.version,
		deviation: input.deviation ? { ...input.deviation } : null,
		recordedBy: context.actor.id,
		recordedAt: context.now
	});
	const rows = [
		readingRow(id, 'before', 0, input.before),
		...input.during.map((reading, index) => readingRow(id, 'during', index, reading)),
		readingRow(id, 'after', 0, input.after)
	];
	await tx.insert(readings).values(rows);
	if (verdict.findings.length > 0) {
		await tx
			.insert(findings)
			.values(
				verdict.findings.map((finding, ordinal) => ({ ...finding, id: newId(), sessionId: id, ordinal }))
			);
	}
}

function readingRow(
	sessionId: string,
	phase: 'before' | 'during' | 'after',
	ordinal: number,
	{ at, ...values }: Reading
): typeof readings.$inferInsert {
	return { id: newId(), sessionId, phase, ordinal, at: at ? parseRfc3339(at) : null, ...values };
}

/** What the session told about the patient, for the nameboard and for the next session's page. */
async function updateEpisode(
	tx: Tx,
	context: PersonContext,
	episode: EpisodeRow,
	input: SessionBody,
	verdict: Verdict
): Promise<void> {
	const reached = verdict.outcome === 'stop' ? episode.level : Math.max(episode.level, input.level);
	await tx
		.update(episodes)
		.set({
			level: reached,
			levelReached: Math.max(episode.levelReached, reached),
			rhythm: input.context.rhythm,
			betaBlocked: input.context.betaBlocked ?? episode.betaBlocked
		})
		.where(eq(episodes.id, episode.id));
	// A new set of readings is the re-check that somebody still owed.
	await tx
		.update(escalations)
		.set({ recheckDoneAt: context.now })
		.where(
			and(
				eq(escalations.episodeId, episode.id),
				isNotNull(escalations.recheckDueAt),
				isNull(escalations.recheckDoneAt)
			)
		);
}

/** What was done without its clearance becomes an ask, so that the decider is told and owes an answer. */
async function askForDeviations(
	tx: Tx,
	context: PersonContext,
	episode: EpisodeRow,
	facts: EpisodeFacts,
	missing: ClearanceKind[],
	input: SessionBody
): Promise<Change<unknown>[]> {
	const asks: Change<unknown>[] = [];
	const threadId = await threadForDeed(tx, episode.id, undefined);
	for (const kind of missing) {
		const operationId = facts.operation?.id ?? null;
		const { open, lapsed } = await openOrInForce(tx, context, episode.id, kind, operationId);
		asks.push(...lapsed);
		if (!open) {
			const question = m.bedside_deviation_question({ reason: input.deviation?.reason ?? '' });
			asks.push(await insertAsk(tx, context, { episode, facts, threadId }, { kind, question }));
		}
	}
	return asks;
}

async function consequences(
	tx: Tx,
	episode: EpisodeRow,
	id: string,
	input: SessionBody,
	verdict: Verdict,
	asks: Change<unknown>[]
): Promise<Change<{ id: string; findings: Verdict['findings']; outcome: Verdict['outcome'] }>> {
	const threadId = await threadForDeed(tx, episode.id, undefined);
	const body = summaryText(input, verdict);
	return {
		result: { id, findings: verdict.findings, outcome: verdict.outcome },
		audit: [
			{
				action: 'session.recorded',
				objectKind: 'session',
				objectId: id,
				episodeId: episode.id,
				detail: { outcome: verdict.outcome, deviation: Boolean(input.deviation) }
			},
			...asks.flatMap((ask) => ask.audit)
		],
		entries: [
			...(threadId
				? [{ threadId, kind: 'session' as const, body, ref: { kind: 'session' as const, id } }]
				: []),
			...asks.flatMap((ask) => ask.entries ?? [])
		],
		events: [
			{ topic: 'session', kind: 'recorded', id, episodeId: episode.id },
			...asks.flatMap((ask) => ask.events ?? [])
		]
	};
}
