import type { Context } from '../context';
import type { Tx } from '../db';
import { escalationMoves } from '../db/schema';
import { personOf } from '$lib/domain/access/actor';
import { newId } from '../ids';

type MoveKind = (typeof escalationMoves.$inferInsert)['kind'];

/** Write one line of an escalation's history. */
export async function recordMove(
	tx: Tx,
	context: Context,
	escalationId: string,
	kind: MoveKind,
	detail: Record<string, unknown> | null = null
): Promise<void> {
	const by = context.actor && personOf(context.actor);
	await tx.insert(escalationMoves).values({
		id: newId(),
		escalationId,
		at: context.now,
		byId: by?.id ?? null,
		kind,
		detail
	});
}
