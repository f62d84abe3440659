import { activityByCode } from '$lib/domain/bedside/activities/activities';
import { assess } from '$lib/domain/bedside/assess';
import { barsOf } from '$lib/domain/bedside/bars';
import type { Phase } from '$lib/domain/bedside/codes';
import type { Verdict } from '$lib/domain/bedside/finding';
import type { Assessment, SessionBody } from '$lib/domain/bedside/forms';
import { limitsOfPatient, setOfUnit, type LocalLayers } from '$lib/domain/bedside/limits/layers';
import type { LimitSet } from '$lib/domain/bedside/limits/limits';
import { lackingClearance } from '$lib/domain/bedside/rules/clearances';
import type { ClearanceKind } from '$lib/domain/core/codes';
import { Problem, invalidField } from '$lib/domain/core/errors';
import { parseRfc3339 } from '$lib/domain/core/instant';
import { accessEpisode } from '../access/access';
import { threadForDeed } from '../access/thread';
import type { PersonContext } from '../context';
import { factsDuring, type EpisodeFacts } from '../episodes/facts';
import { whereAt } from '../episodes/place';
import { newId } from '../ids';
import { askForSignature } from '../levels/sign-off';
import { layersOf } from '../limits/queries';
import { write, type Change, type Written } from '../write';
import { carryOver } from './carry-over';
import { insertDeviations, type Lacking } from './deviations';
import { insertSession, type SessionOf } from './store';
import { summaryText } from './summary';

/** A clock of a phone may run ahead of the server's by this much. */
const FUTURE_MS = 5 * 60 * 1000;

interface Recorded {
	id: string;
	findings: Verdict['findings'];
	outcome: Verdict['outcome'];
}

/**
 * Record one bedside treatment, judged by the same function as the page and by the clearances on record as they
 * stood when it happened.
 * @throws Problem `clearance-needed` when something was done whose clearance was not in force, unless it comes
 * with a deviation: what happened is never refused a place in the record
 */
export function recordSession(
	context: PersonContext,
	episodeId: string,
	input: SessionBody
): Promise<Written<Recorded>> {
	return write(context, 'session.record', async (tx) => {
		const episode = await accessEpisode(tx, context.actor, episodeId, 'session.record');
		refuseFuture(input, context.now);
		const facts = await factsDuring(tx, episode, {
			startedAt: parseRfc3339(input.startedAt),
			endedAt: parseRfc3339(input.endedAt)
		});
		const was = await whereAt(tx, episode, parseRfc3339(input.endedAt));
		const told = withRecord(input, was.phase, facts);
		const lacking = lackingOf(told, facts);
		if (lacking.length > 0 && !input.deviation) {
			throw clearanceNeeded(lacking.map(({ kind }) => kind));
		}
		// The limits that held when the session ended, also where it is entered afterwards.
		const layers = await layersOf(tx, { id: episodeId, unitId: was.unitId }, parseRfc3339(input.endedAt));
		const judged = withRange(told, layers);
		const limits = limitsThatJudge(judged.context, was.phase, layers);
		const verdict = assess(judged, limits);
		const of = { id: newId(), episodeId, operationId: facts.operation?.id ?? null };
		const threadId = await threadForDeed(tx, episodeId, context.actor);
		const kept = { ...input, context: judged.context };
		await insertSession(tx, context, of, kept, verdict, barsOf(judged, limits));
		await insertDeviations(tx, context, { sessionId: of.id, episodeId, threadId }, lacking, input);
		await carryOver(tx, context, episode, input, verdict);
		await askForSignature(tx, context, { id: episodeId, unitId: was.unitId }, of.id, input);
		const body = summaryText(input, verdict, lacking, was.phase);
		return recorded(of, threadId, body, verdict, lacking);
	});
}

/** Phase, clearances and limits on record count, not those that the client believes in. */
function withRecord(input: SessionBody, phase: Phase, facts: EpisodeFacts): Assessment {
	const clearances = facts.newest.map((row) => ({
		kind: row.kind,
		state: row.state,
		maxElevationDeg: row.limits?.maxElevationDeg ?? null,
		maxLoadKg: row.limits?.maxLoadKg ?? null
	}));
	const sternotomy = facts.operation ? facts.precautions.sternal : input.context.sternotomy;
	const { limits: _believed, ...context } = input.context;
	return { ...input, context: { ...context, phase, sternotomy, clearances, level: input.level } };
}

/** A range on record counts, and is kept with the session; without one, what the client was told to go by. */
function withRange(told: Assessment, { prescribed }: LocalLayers): Assessment {
	if (!prescribed) {
		return told;
	}
	const { hrMin, hrMax, rpeMin, rpeMax } = prescribed;
	return { ...told, context: { ...told.context, prescribed: { hrMin, hrMax, rpeMin, rpeMax } } };
}

/** The limits of unit, patient and range. */
function limitsThatJudge({ set }: Assessment['context'], phase: Phase, layers: LocalLayers): LimitSet {
	return limitsOfPatient(set ?? setOfUnit(layers.unit, phase), layers);
}

/** The clearances that what was done lacked, each once, with how they stood. */
function lackingOf({ context, activities }: Assessment, facts: EpisodeFacts): Lacking[] {
	const kinds = activities
		.filter((done) => !done.notDone)
		.map((done) => lackingClearance(context, activityByCode(done.code)))
		.filter((kind) => kind !== null);
	return [...new Set(kinds)].map((kind) => ({
		kind,
		stood: facts.newest.find((row) => row.kind === kind)?.state ?? null
	}));
}

function clearanceNeeded(needed: ClearanceKind[]): Problem {
	return new Problem('clearance-needed', `Not cleared: ${needed.join(', ')}.`, { needed });
}

function refuseFuture(input: SessionBody, now: number): void {
	// The end too: the limits that judge are those of its moment.
	for (const field of ['startedAt', 'endedAt'] as const) {
		if (parseRfc3339(input[field]) > now + FUTURE_MS) {
			throw invalidField(`/${field}`, `${field} ${input[field]} lies in the future.`);
		}
	}
}

function recorded(
	{ id, episodeId }: SessionOf,
	threadId: string | null,
	body: string,
	{ findings, outcome }: Verdict,
	lacking: readonly Lacking[]
): Change<Recorded> {
	return {
		result: { id, findings, outcome },
		audit: {
			action: 'session.recorded',
			objectKind: 'session',
			objectId: id,
			episodeId,
			detail: { outcome, deviations: lacking.map(({ kind }) => kind).join() || null }
		},
		entries: threadId ? [{ threadId, kind: 'session', body, ref: { kind: 'session', id } }] : [],
		events: [{ topic: 'session', kind: 'recorded', id, episodeId }]
	};
}
