import { and, asc, desc, eq, gt, gte, inArray } from 'drizzle-orm';
import type { RuleId } from '$lib/domain/bedside/codes';
import type { Finding } from '$lib/domain/bedside/finding';
import type { Assessment, Context, Reading } from '$lib/domain/bedside/forms';
import { adviseLevel, type Advice } from '$lib/domain/bedside/progress';
import { CALM_HOURS_BEFORE_WALKING, type WalkingChecks } from '$lib/domain/bedside/readiness';
import { LEVELS, type Level } from '$lib/domain/core/codes';
import { HOUR } from '$lib/domain/core/time';
import { notInError } from '../bedside/queries';
import type { Reader } from '../db';
import { bedsideSessions, findings, levelDecisions, readings } from '../db/schema';

export interface SessionAdvice {
	advice: Advice;
	sessionId: string;
	sessionLevel: Level;
	/** When the session began. */
	at: number;
}

/** What the newest session of an episode speaks for, from the verdict as it was stored; null without a session. */
export async function adviceOf(db: Reader, episodeId: string, today: Level): Promise<SessionAdvice | null> {
	const [session] = await db
		.select()
		.from(bedsideSessions)
		.where(and(eq(bedsideSessions.episodeId, episodeId), notInError()))
		.orderBy(desc(bedsideSessions.startedAt), desc(bedsideSessions.id))
		.limit(1);
	if (!session) {
		return null;
	}
	const measured = await db
		.select()
		.from(readings)
		.where(eq(readings.sessionId, session.id))
		.orderBy(asc(readings.ordinal));
	const found = await db
		.select()
		.from(findings)
		.where(eq(findings.sessionId, session.id))
		.orderBy(asc(findings.ordinal));
	const verdict = {
		findings: found as unknown as Finding[],
		outcome: session.outcome,
		notJudged: session.notJudged as RuleId[],
		set: found[0]?.set ?? 'strict',
		version: session.limitVersion
	};
	const walking = await walkingChecks(db, session);
	const sessionLevel = levelOf(session.level);
	const basis = { sessionLevel, decidedSince: await decidedSince(db, session) };
	const advice = adviseLevel(today, toAssessment(session, measured), verdict, walking, basis);
	return { advice, sessionId: session.id, sessionLevel, at: session.startedAt };
}

async function decidedSince(db: Reader, { episodeId, endedAt }: Session): Promise<boolean> {
	const [later] = await db
		.select({ id: levelDecisions.id })
		.from(levelDecisions)
		.where(and(eq(levelDecisions.episodeId, episodeId), gt(levelDecisions.decidedAt, endedAt)))
		.limit(1);
	return later !== undefined;
}

/** What the sessions of the hours before say against walking; what none of them says, nobody has said. */
async function walkingChecks(db: Reader, { episodeId, endedAt }: Session): Promise<WalkingChecks> {
	const since = endedAt - CALM_HOURS_BEFORE_WALKING * HOUR;
	const recent = await db
		.select({ id: bedsideSessions.id, symptoms: bedsideSessions.symptoms })
		.from(bedsideSessions)
		.where(and(eq(bedsideSessions.episodeId, episodeId), gte(bedsideSessions.endedAt, since), notInError()));
	const ids = recent.map(({ id }) => id);
	const rhythms = await db.$count(
		findings,
		and(inArray(findings.sessionId, ids), eq(findings.rule, 'new-rhythm'))
	);
	const pain = recent.some(({ symptoms }) => (symptoms as Assessment['symptoms']).some(isAngina));
	return { chestPain: pain || null, heartFailureSigns: null, newRhythm: rhythms > 0 || null };
}

function isAngina(symptom: Assessment['symptoms'][number]): boolean {
	return (typeof symptom === 'string' ? symptom : symptom.code) === 'angina';
}

/** A stored level, which is one of the six. */
export function levelOf(stored: number): Level {
	return LEVELS.find((level) => level === stored) ?? 1;
}

type Session = typeof bedsideSessions.$inferSelect;
type Row = typeof readings.$inferSelect;

function toAssessment(session: Session, rows: readonly Row[]): Assessment {
	const of = (phase: Row['phase']) => rows.filter((row) => row.phase === phase).map(toReading);
	return {
		context: session.context as Context,
		before: of('before')[0] ?? {},
		during: of('during'),
		after: of('after')[0] ?? {},
		symptoms: session.symptoms as Assessment['symptoms'],
		activities: session.activities as Assessment['activities']
	};
}

function toReading({
	id: _id,
	sessionId: _session,
	phase: _phase,
	ordinal: _ordinal,
	at: _at,
	...values
}: Row): Reading {
	return values;
}
