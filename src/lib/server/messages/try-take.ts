/** Taking a call for help by telephone, by a text or by a digit: whoever it is, the same is decided for both. */
import { eq } from 'drizzle-orm';
import { Problem } from '$lib/domain/core/errors';
import type { Role } from '$lib/domain/core/codes';
import { isOpenTo } from '$lib/domain/escalations/holding';
import type { PlaceFields } from '$lib/domain/messages/templates/escalation';
import { accessEscalation } from '../access/access';
import type { PersonContext } from '../context';
import type { Reader, Tx } from '../db';
import { units, users } from '../db/schema';
import { confirm } from '../escalations/pass';
import { take, type TakenVia } from '../escalations/take';
import { placeOf, type EscalationRow } from '../escalations/tell';
import type { Change } from '../write';

/** What came of it; `change` is null where it was this person's already. */
export type Tried =
	| { kind: 'not-allowed' }
	/** They may not see it: to be answered as if there were none. */
	| { kind: 'unseen' }
	| { kind: 'yours'; escalation: EscalationRow; change: Change<unknown> | null }
	| { kind: 'held'; escalation: EscalationRow; holder: Role; since: number }
	| { kind: 'over'; escalation: EscalationRow; since: number };

/** Take a call, or confirm one that was passed on to this person, if it is to be had. */
export async function tryTake(tx: Tx, context: PersonContext, id: string, via: TakenVia): Promise<Tried> {
	const { actor } = context;
	const escalation = await seen(tx, context, id);
	if (typeof escalation === 'string') {
		return { kind: escalation };
	}
	if (isOpenTo(escalation, actor.id)) {
		return { kind: 'yours', escalation, change: await take(tx, context, actor, escalation, null, via) };
	}
	if (escalation.state === 'taken' && escalation.passTo === actor.id) {
		return { kind: 'yours', escalation, change: await confirm(tx, context, actor, escalation) };
	}
	return standing(tx, actor.id, escalation);
}

/** The same without taking anything: what somebody hears who is only told again. */
export async function whatStands(reader: Reader, context: PersonContext, id: string): Promise<Tried> {
	const escalation = await seen(reader, context, id);
	if (typeof escalation === 'string') {
		return { kind: escalation };
	}
	return isOpenTo(escalation, context.actor.id)
		? { kind: 'unseen' }
		: standing(reader, context.actor.id, escalation);
}

async function seen(
	reader: Reader,
	{ actor }: PersonContext,
	id: string
): Promise<EscalationRow | 'not-allowed' | 'unseen'> {
	try {
		return (await accessEscalation(reader, actor, id, 'escalation.take')).escalation;
	} catch (error) {
		if (!(error instanceof Problem)) {
			throw error;
		}
		return error.code === 'not-allowed' ? 'not-allowed' : 'unseen';
	}
}

/** Somebody has it, perhaps this person by an earlier press; or it has ended. */
async function standing(reader: Reader, userId: string, escalation: EscalationRow): Promise<Tried> {
	const { state, takenBy, takenAt, endedAt, raisedAt } = escalation;
	if (state === 'taken' && takenBy === userId) {
		return { kind: 'yours', escalation, change: null };
	}
	if (state !== 'taken') {
		return { kind: 'over', escalation, since: endedAt ?? raisedAt };
	}
	const [holder] = await reader
		.select({ role: users.role })
		.from(users)
		.where(eq(users.id, takenBy ?? ''));
	return { kind: 'held', escalation, holder: holder?.role ?? 'nurse', since: takenAt ?? raisedAt };
}

/** What texts and calls say of the place: unit, bed and grade, and the unit's zone for the time of its clock. */
export async function placeFields(
	reader: Reader,
	escalation: EscalationRow
): Promise<PlaceFields & { zone: string }> {
	const { unitId, unit, bed } = await placeOf(reader, escalation.episodeId);
	const [row] = await reader.select({ zone: units.zone }).from(units).where(eq(units.id, unitId));
	return { unit, bed, grade: escalation.grade, zone: row?.zone ?? 'UTC' };
}
