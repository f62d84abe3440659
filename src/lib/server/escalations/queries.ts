import { and, asc, eq, gte, max, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import type { Person } from '$lib/domain/access/actor';
import { notFound } from '$lib/domain/core/errors';
import { toRfc3339 } from '$lib/domain/core/instant';
import { chainPosts, chainStep, isChainSpent } from '$lib/domain/escalations/chain';
import { askedOf, etaOf, isOpenTo, UNDO_MS } from '$lib/domain/escalations/holding';
import type { EscalationView, PhoneEscalation } from '$lib/domain/escalations/views';
import { accessEscalation } from '../access/access';
import type { Reader } from '../db';
import {
	episodes,
	escalationMoves,
	escalations,
	escalationSteps,
	outbox,
	patients,
	units,
	users
} from '../db/schema';
import { findLink } from './link';
import { addedTo, otherCallersOf } from './added';
import type { EscalationRow } from './tell';

const holder = alias(users, 'holder');
const receiver = alias(users, 'receiver');
const ender = alias(users, 'ender');
const named = alias(users, 'named');
const other = alias(users, 'other');

/** The whole of an escalation: who was told by which channel and when, who is next, who has it. */
export async function getEscalation(db: Reader, person: Person, id: string): Promise<EscalationView> {
	await accessEscalation(db, person, id, 'escalation.read');
	const [[row], steps, moves, added] = await Promise.all([
		select(db, id),
		stepsOf(db, id),
		movesOf(db, id),
		addedTo(db, id)
	]);
	if (!row) {
		throw notFound('escalation');
	}
	const { escalation: e } = row;
	return {
		id,
		episodeId: e.episodeId,
		unit: row.unit,
		unitId: row.unitId,
		bed: row.bed,
		patientName: row.patientName,
		birthDate: row.birthDate,
		mrn: row.mrn,
		grade: e.grade,
		state: e.state,
		situation: e.situation,
		background: e.background,
		assessment: e.assessment,
		request: e.request,
		neededBy: opt(e.neededBy),
		sessionId: e.sessionId,
		threadId: e.threadId,
		raisedBy: row.raisedBy,
		raisedAt: toRfc3339(e.raisedAt),
		toldInPerson: row.named,
		...added,
		otherCallers: await otherCallersOf(db, e),
		holder: row.holder,
		takenAt: opt(e.takenAt),
		etaMinutes: e.etaMinutes,
		etaAt: opt(etaOf(e)),
		askedAt: opt(e.holderAskedAt),
		arrivedAt: opt(e.arrivedAt),
		passTo: row.receiver,
		passReason: e.passReason,
		endedBy: row.ender,
		endedAt: opt(e.endedAt),
		outcome: e.outcome,
		note: e.note,
		informed: e.informed,
		recheckDueAt: opt(e.recheckDueAt),
		chainStartedAt: toRfc3339(e.chainStartedAt),
		steps,
		next: nextOf(e),
		chainSpent: e.nextStepAt !== null && e.nextStep !== null && isChainSpent(e.grade, e.nextStep),
		moves
	};
}

/**
 * What the secret link shows to whoever holds it, without changing anything.
 * @throws Problem `not-found` for an unknown or expired link
 */
export async function getByLink(db: Reader, token: string, now: number): Promise<PhoneEscalation> {
	const link = await findLink(db, token);
	const [row] = link ? await select(db, link.escalationId) : [];
	if (!link || !row || link.expiresAt <= now) {
		throw notFound('link');
	}
	const { escalation: e } = row;
	return {
		id: e.id,
		unit: row.unit,
		bed: row.bed,
		grade: e.grade,
		state: e.state,
		raisedAt: toRfc3339(e.raisedAt),
		raisedByRole: row.raisedBy.role,
		holder: row.holder?.name ?? null,
		takenAt: e.takenAt === null ? null : toRfc3339(e.takenAt),
		mine: e.takenBy === link.userId,
		passedToMe: e.state === 'taken' && e.passTo === link.userId,
		etaAt: opt(etaOf(e)),
		arrivedAt: opt(e.arrivedAt),
		asked: e.takenBy === link.userId && askedOf(e),
		undoUntil: opt(e.takenBy === link.userId && e.takenAt !== null ? e.takenAt + UNDO_MS : null),
		usable: isOpenTo(e, link.userId) && link.usedAt === null,
		chainStartedAt: toRfc3339(e.chainStartedAt),
		steps: chainPosts(e.grade, await lastToldStep(db, e)),
		nextAt: nextOf(e)?.at ?? null
	};
}

const opt = (at: number | null) => (at === null ? null : toRfc3339(at));

/** The last step that was told since the chain started; -1 when none was. */
async function lastToldStep(db: Reader, e: EscalationRow): Promise<number> {
	const [row] = await db
		.select({ step: max(escalationSteps.step) })
		.from(escalationSteps)
		.where(and(eq(escalationSteps.escalationId, e.id), gte(escalationSteps.at, e.chainStartedAt)));
	return row?.step ?? -1;
}

function nextOf(e: EscalationRow): EscalationView['next'] {
	if (e.nextStep === null || e.nextStepAt === null) {
		return null;
	}
	return { step: e.nextStep, posts: chainStep(e.grade, e.nextStep).posts, at: toRfc3339(e.nextStepAt) };
}

function select(db: Reader, id: string) {
	return db
		.select({
			escalation: escalations,
			unit: units.name,
			unitId: units.id,
			bed: episodes.bed,
			patientName: patients.name,
			birthDate: patients.birthDate,
			mrn: patients.mrn,
			raisedBy: { id: users.id, name: users.name, role: users.role },
			holder: { id: holder.id, name: holder.name },
			receiver: { id: receiver.id, name: receiver.name },
			ender: { id: ender.id, name: ender.name },
			named: { id: named.id, name: named.name }
		})
		.from(escalations)
		.innerJoin(episodes, eq(episodes.id, escalations.episodeId))
		.innerJoin(units, eq(units.id, episodes.unitId))
		.innerJoin(patients, eq(patients.id, episodes.patientId))
		.innerJoin(users, eq(users.id, escalations.raisedBy))
		.leftJoin(holder, eq(holder.id, escalations.takenBy))
		.leftJoin(receiver, eq(receiver.id, escalations.passTo))
		.leftJoin(ender, eq(ender.id, escalations.endedBy))
		.leftJoin(named, eq(named.id, escalations.toldInPerson))
		.where(eq(escalations.id, id));
}

async function stepsOf(db: Reader, id: string): Promise<EscalationView['steps']> {
	const rows = await db
		.select({
			step: escalationSteps.step,
			post: escalationSteps.post,
			name: users.name,
			channel: escalationSteps.channel,
			at: escalationSteps.at,
			message: outbox.state
		})
		.from(escalationSteps)
		.leftJoin(users, eq(users.id, escalationSteps.userId))
		.leftJoin(outbox, eq(outbox.id, escalationSteps.messageId))
		.where(eq(escalationSteps.escalationId, id))
		.orderBy(asc(escalationSteps.at), asc(escalationSteps.id));
	return rows.map((row) => ({ ...row, at: toRfc3339(row.at) }));
}

/** Whom a move names beside its maker: the receiver of a pass, its giver, whoever was told or asked. */
const OTHER_PERSON = sql`coalesce(json_extract(${escalationMoves.detail}, '$.to'), json_extract(${escalationMoves.detail}, '$.from'))`;

async function movesOf(db: Reader, id: string): Promise<EscalationView['moves']> {
	const rows = await db
		.select({
			at: escalationMoves.at,
			by: users.name,
			kind: escalationMoves.kind,
			other: other.name,
			etaMinutes: sql<number | null>`json_extract(${escalationMoves.detail}, '$.etaMinutes')`
		})
		.from(escalationMoves)
		.leftJoin(users, eq(users.id, escalationMoves.byId))
		.leftJoin(other, eq(other.id, OTHER_PERSON))
		.where(eq(escalationMoves.escalationId, id))
		.orderBy(asc(escalationMoves.at), asc(escalationMoves.id));
	return rows.map((row) => ({ ...row, at: toRfc3339(row.at) }));
}
