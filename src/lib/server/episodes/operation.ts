import { and, desc, eq } from 'drizzle-orm';
import type { Person } from '$lib/domain/access/actor';
import { invalidField, Problem } from '$lib/domain/core/errors';
import { parseRfc3339, toRfc3339 } from '$lib/domain/core/instant';
import { localDateOf } from '$lib/domain/core/time';
import { OPERATION_FIELDS, type Correction, type RecordOperation } from '$lib/domain/episodes/operation';
import { m } from '$lib/i18n/paraglide/messages';
import { accessEpisode } from '../access/access';
import { threadForDeed } from '../access/thread';
import { resolveSurgeon } from '../access/units';
import type { PersonContext } from '../context';
import type { Reader, Tx } from '../db';
import { operationAmendments, operations, users } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { write, type Change, type Written } from '../write';

type Operation = typeof operations.$inferSelect;
type Values = Pick<Operation, 'procedure' | 'approach' | 'operatedAt' | 'surgeonId'>;

/**
 * Put an operation on record after the admission, or correct what stands there: day, precautions and clearances
 * count from it. A correction keeps what was there before.
 * @throws Problem `invalid` for an operation to correct that is not of this stay; `wrong-state` when the
 * correction says what is on record already
 */
export function recordOperation(
	context: PersonContext,
	episodeId: string,
	input: RecordOperation
): Promise<Written<{ id: string }>> {
	return write(context, 'operation.record', async (tx) => {
		await accessEpisode(tx, context.actor, episodeId, 'operation.record');
		const { procedure, approach, surgeonId, corrects } = input;
		const values: Values = {
			procedure,
			approach,
			operatedAt: parseRfc3339(input.operatedAt),
			surgeonId: surgeonId ? await resolveSurgeon(tx, surgeonId, '/surgeonId') : null
		};
		const id = corrects ?? newId();
		if (corrects) {
			await correct(tx, context, await operationOf(tx, episodeId, corrects), values);
		} else {
			await tx.insert(operations).values({ id, episodeId, ...values, createdAt: context.now });
		}
		return told(tx, context, episodeId, id, values, corrects !== undefined);
	});
}

/** What an operation of a stay said before, the newest correction first. */
export async function correctionsOf(db: Reader, person: Person, episodeId: string): Promise<Correction[]> {
	await accessEpisode(db, person, episodeId, 'episode.read');
	const rows = await db
		.select({
			field: operationAmendments.field,
			before: operationAmendments.before,
			by: users.name,
			at: operationAmendments.at
		})
		.from(operationAmendments)
		.innerJoin(operations, eq(operations.id, operationAmendments.operationId))
		.innerJoin(users, eq(users.id, operationAmendments.byId))
		.where(eq(operations.episodeId, episodeId))
		.orderBy(desc(operationAmendments.at));
	return rows.map((row) => ({ ...row, at: toRfc3339(row.at) }));
}

async function operationOf(tx: Tx, episodeId: string, id: string): Promise<Operation> {
	const [row] = await tx
		.select()
		.from(operations)
		.where(and(eq(operations.id, id), eq(operations.episodeId, episodeId)));
	if (!row) {
		throw invalidField('/corrects', `corrects ${id} is no operation of this episode.`);
	}
	return row;
}

async function correct(tx: Tx, context: PersonContext, known: Operation, values: Values): Promise<void> {
	const after = { ...values, surgeonId: values.surgeonId ?? known.surgeonId };
	const changed = OPERATION_FIELDS.filter((field) => after[field] !== known[field]);
	if (changed.length === 0) {
		throw new Problem('wrong-state', 'The record says this already; nothing was changed.');
	}
	await tx.update(operations).set(after).where(eq(operations.id, known.id));
	await tx.insert(operationAmendments).values(
		changed.map((field) => ({
			id: newId(),
			operationId: known.id,
			at: context.now,
			byId: context.actor.id,
			field,
			before: textOf(known[field]),
			after: textOf(after[field])
		}))
	);
}

/** An instant is kept as people and programs read it elsewhere. */
function textOf(value: string | number | null): string | null {
	return typeof value === 'number' ? toRfc3339(value) : value;
}

async function told(
	tx: Tx,
	context: PersonContext,
	episodeId: string,
	id: string,
	{ procedure, operatedAt }: Values,
	corrected: boolean
): Promise<Change<{ id: string }>> {
	const threadId = await threadForDeed(tx, episodeId, context.actor);
	const words = { procedure, day: localDateOf(operatedAt, env().hospital.zone) };
	const body = corrected ? m.patient_entry_operation_corrected(words) : m.patient_entry_operation(words);
	return {
		result: { id },
		audit: {
			action: corrected ? 'operation.corrected' : 'operation.recorded',
			objectKind: 'operation',
			objectId: id,
			episodeId
		},
		entries: threadId ? [{ threadId, kind: 'event', body }] : [],
		events: [{ topic: 'episode', kind: 'operation', id: episodeId, episodeId }]
	};
}
