import { personOf } from '$lib/domain/access/actor';
import type { Context } from '../context';
import type { Tx } from '../db';
import { clearanceMoves } from '../db/schema';
import { newId } from '../ids';

/** Write one line of a clearance's history; nobody stands beside a move that no person made. */
export async function recordClearanceMove(
	tx: Tx,
	{ actor, now }: Context,
	move: Omit<typeof clearanceMoves.$inferInsert, 'id' | 'at' | 'byId'>
): Promise<void> {
	const byId = (actor && personOf(actor)?.id) ?? null;
	await tx.insert(clearanceMoves).values({ ...move, id: newId(), at: now, byId });
}
