import { createHash } from 'node:crypto';
import { desc } from 'drizzle-orm';
import type { Actor } from '$lib/domain/access/actor';
import type { AuditEvent } from '$lib/domain/audit/actions';
import type { Tx } from '../db';
import { audit } from '../db/schema';

/** What the first row is chained to. */
export const CHAIN_START = '0'.repeat(64);

type AuditRow = Omit<typeof audit.$inferSelect, 'hash'>;

/** Append rows to the audit chain inside the transaction of the change: without the row there is no change. */
export async function appendAudit(
	tx: Tx,
	who: { actor: Actor | null; address: string | null; now: number },
	events: AuditEvent[]
): Promise<void> {
	const [last] = await tx
		.select({ seq: audit.seq, hash: audit.hash })
		.from(audit)
		.orderBy(desc(audit.seq))
		.limit(1);
	let seq = last?.seq ?? 0;
	let prev = last?.hash ?? CHAIN_START;
	for (const event of events) {
		seq += 1;
		const row: AuditRow = {
			seq,
			at: who.now,
			...describe(who.actor),
			address: who.address,
			action: event.action,
			objectKind: event.objectKind,
			objectId: event.objectId,
			episodeId: event.episodeId ?? null,
			outcome: event.outcome ?? 'done',
			detail: event.detail ?? null,
			prev
		};
		const hash = hashRow(row);
		await tx.insert(audit).values({ ...row, hash });
		prev = hash;
	}
}

/** SHA-256 over the row's fields in a fixed order, the previous hash among them. */
export function hashRow(row: AuditRow): string {
	const fields = [
		row.seq,
		row.at,
		row.actorKind,
		row.actorId,
		row.address,
		row.action,
		row.objectKind,
		row.objectId,
		row.episodeId,
		row.outcome,
		row.detail,
		row.prev
	];
	return createHash('sha256').update(JSON.stringify(fields)).digest('hex');
}

function describe(actor: Actor | null): Pick<AuditRow, 'actorKind' | 'actorId'> {
	if (!actor) {
		return { actorKind: 'anonymous', actorId: '-' };
	}
	// Somebody who used a secret link is that person; the action's detail says that it was a link.
	return actor.kind === 'link'
		? { actorKind: 'person', actorId: actor.person.id }
		: { actorKind: actor.kind, actorId: actor.id };
}
