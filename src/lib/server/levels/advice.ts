import { and, asc, desc, eq } from 'drizzle-orm';
import type { RuleId } from '$lib/domain/bedside/codes';
import type { Finding } from '$lib/domain/bedside/finding';
import type { Assessment, Context, Reading } from '$lib/domain/bedside/forms';
import { adviseLevel, type Advice } from '$lib/domain/bedside/progress';
import { LEVELS, type Level } from '$lib/domain/core/codes';
import { notInError } from '../bedside/queries';
import type { Reader } from '../db';
import { bedsideSessions, findings, readings } from '../db/schema';

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
	const advice = adviseLevel(today, toAssessment(session, measured), verdict);
	return { advice, sessionId: session.id, sessionLevel: levelOf(session.level), at: session.startedAt };
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
