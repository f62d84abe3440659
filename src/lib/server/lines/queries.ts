import { aliasedTable, and, desc, eq, inArray, isNotNull, isNull, sql } from 'drizzle-orm';
import { toRfc3339 } from '$lib/domain/core/instant';
import type { LineKind } from '$lib/domain/lines/codes';
import { inListOrder, standingOxygen } from '$lib/domain/lines/stand';
import type { LineNote, SaidOxygen } from '$lib/domain/lines/views';
import { notInError } from '../bedside/queries';
import type { Reader } from '../db';
import { bedsideSessions, lines, oxygenNotes, readings, users } from '../db/schema';

/** All lines of an episode, those noted in last first. */
export async function listLines(db: Reader, episodeId: string): Promise<LineNote[]> {
	const outUsers = aliasedTable(users, 'out_users');
	const rows = await db
		.select({ line: lines, inBy: users.name, outBy: outUsers.name })
		.from(lines)
		.innerJoin(users, eq(users.id, lines.inBy))
		.leftJoin(outUsers, eq(outUsers.id, lines.outBy))
		.where(eq(lines.episodeId, episodeId))
		.orderBy(desc(lines.inAt), desc(lines.id));
	return rows.map(({ line: { id, kind, inAt, outAt }, inBy, outBy }) => ({
		id,
		kind,
		inBy,
		inAt: toRfc3339(inAt),
		outBy,
		outAt: outAt === null ? null : toRfc3339(outAt)
	}));
}

/** What is in, by episode, with one query for all of them; an episode without a line is missing. */
export async function linesInOf(db: Reader, episodeIds: string[]): Promise<Map<string, LineKind[]>> {
	const rows = await db
		.select({ episodeId: lines.episodeId, kind: lines.kind })
		.from(lines)
		.where(and(inArray(lines.episodeId, episodeIds), isNull(lines.outAt)));
	return new Map(
		[...grouped(rows)].map(([episodeId, own]) => [episodeId, inListOrder(own.map(({ kind }) => kind))])
	);
}

/** The oxygen that stands, by episode, with two queries for all of them; one of which nobody has said any is missing. */
export async function oxygenOf(db: Reader, episodeIds: string[]): Promise<Map<string, SaidOxygen>> {
	const [noted, read] = await Promise.all([notesOf(db, episodeIds), readingsOf(db, episodeIds)]);
	const standing = new Map<string, SaidOxygen>();
	for (const [episodeId, said] of grouped([...noted, ...read])) {
		const newest = standingOxygen(said);
		if (newest) {
			const { lpm, at, by } = newest;
			standing.set(episodeId, { lpm, at: toRfc3339(at), by });
		}
	}
	return standing;
}

/** The newest note of each episode. */
function notesOf(db: Reader, episodeIds: string[]) {
	const ranked = db
		.select({
			episodeId: oxygenNotes.episodeId,
			lpm: oxygenNotes.lpm,
			at: oxygenNotes.notedAt,
			by: users.name,
			place: sql<number>`row_number() over (
				partition by ${oxygenNotes.episodeId} order by ${oxygenNotes.notedAt} desc, ${oxygenNotes.id} desc
			)`.as('place')
		})
		.from(oxygenNotes)
		.innerJoin(users, eq(users.id, oxygenNotes.notedBy))
		.where(inArray(oxygenNotes.episodeId, episodeIds))
		.as('ranked');
	return db.select().from(ranked).where(eq(ranked.place, 1));
}

/**
 * The newest reading of each episode that carries oxygen. One without an instant of its own is of the session's
 * beginning, and after the treatment of its end; of the same instant the later in the session counts.
 */
function readingsOf(db: Reader, episodeIds: string[]) {
	const { phase } = readings;
	const at = sql<number>`coalesce(${readings.at},
		case ${phase} when 'after' then ${bedsideSessions.endedAt} else ${bedsideSessions.startedAt} end)`;
	const ranked = db
		.select({
			episodeId: bedsideSessions.episodeId,
			lpm: sql<number>`${readings.oxygenLpm}`.as('lpm'),
			at: at.as('at'),
			by: users.name,
			place: sql<number>`row_number() over (
				partition by ${bedsideSessions.episodeId}
				order by ${at} desc, ${phase} = 'after' desc, ${phase} = 'during' desc, ${readings.ordinal} desc
			)`.as('place')
		})
		.from(readings)
		.innerJoin(bedsideSessions, eq(bedsideSessions.id, readings.sessionId))
		.innerJoin(users, eq(users.id, bedsideSessions.recordedBy))
		.where(and(inArray(bedsideSessions.episodeId, episodeIds), isNotNull(readings.oxygenLpm), notInError()))
		.as('ranked');
	return db.select().from(ranked).where(eq(ranked.place, 1));
}

function grouped<T extends { episodeId: string }>(rows: readonly T[]): Map<string, T[]> {
	const groups = new Map<string, T[]>();
	for (const row of rows) {
		groups.set(row.episodeId, [...(groups.get(row.episodeId) ?? []), row]);
	}
	return groups;
}
