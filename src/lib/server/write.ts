import { personOf } from '$lib/domain/access/actor';
import { can, type Permission } from '$lib/domain/access/can';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { Problem } from '$lib/domain/core/errors';
import type { LiveEvent } from '$lib/domain/live/events';
import { appendAudit } from './audit/append';
import type { Context } from './context';
import { db, transact, type Tx } from './db';
import { wakeWorkers } from './effects';
import { firstAnswer, keepAnswer, withKey } from './idempotency';
import { publish } from './live/hub';
import { appendLive } from './live/log';
import { enqueue, type NewMessage } from './outbox/enqueue';
import { appendEntries, type NewEntry } from './threads/append';

/** What a piece of work changed, and what follows from it. The audit event cannot be left out. */
export interface Change<T> {
	result: T;
	audit: AuditEvent | [AuditEvent, ...AuditEvent[]];
	entries?: NewEntry[];
	events?: LiveEvent[];
	messages?: NewMessage[];
}

/** A change with what had to change before it: all of it is on record and announced, the earlier first. */
export function after<T>(earlier: readonly Change<unknown>[], change: Change<T>): Change<T> {
	return joined(change, [...earlier, change]);
}

/** A change with what it brought about elsewhere: all of it is on record and announced, the consequences last. */
export function bringing<T>(change: Change<T>, later: readonly Change<unknown>[]): Change<T> {
	return joined(change, [change, ...later]);
}

function joined<T>({ result, audit }: Change<T>, all: readonly Change<unknown>[]): Change<T> {
	const [first, ...rest] = all.flatMap((one) => one.audit);
	return {
		result,
		audit: first ? [first, ...rest] : audit,
		entries: all.flatMap((one) => one.entries ?? []),
		events: all.flatMap((one) => one.events ?? []),
		messages: all.flatMap((one) => one.messages ?? [])
	};
}

/** What a write answers. `replayed` is true when the same key had this answer before. */
export interface Written<T> {
	result: T;
	replayed: boolean;
}

/**
 * The one way to change state. In one transaction: the work's own rows, its thread entries, audit rows, live
 * events, outgoing messages, and the answer under the client's key. Live events and workers hear of it after the
 * commit. A crash at any moment leaves all of it or nothing.
 *
 * @param permission checked against the role first; the work checks it against the row through `access*`
 * @param work may await `tx` and nothing else
 * @throws Problem when refused; nothing is written then
 */
export async function write<T>(
	context: Context,
	permission: Permission | 'anyone',
	work: (tx: Tx) => Promise<Change<T>>
): Promise<Written<T>> {
	refuseWrongRole(context, permission);
	const actorId = personOf(context.actor ?? SYSTEM)?.id ?? 'system';
	return withKey(actorId, context.key, async () => {
		const first = context.key && (await firstAnswer(db(), actorId, context.key));
		if (first) {
			return { result: first.answer as T, replayed: true };
		}
		const { result, events } = await transact((tx) => commit(tx, context, actorId, work));
		publish(events);
		wakeWorkers();
		return { result, replayed: false };
	});
}

const SYSTEM = { kind: 'system', id: 'setup' } as const;

async function commit<T>(tx: Tx, context: Context, actorId: string, work: (tx: Tx) => Promise<Change<T>>) {
	const change = await work(tx);
	const audit = Array.isArray(change.audit) ? change.audit : [change.audit];
	const touched = await appendEntries(tx, context, change.entries ?? []);
	await appendAudit(tx, context, audit);
	await enqueue(tx, context.now, change.messages ?? []);
	const events = await appendLive(tx, context.now, [...(change.events ?? []), ...touched]);
	if (context.key) {
		await keepAnswer(tx, actorId, context.key, context.now, change.result);
	}
	return { result: change.result, events };
}

/** People are asked for their role; the system's own work, patients and link holders are checked by the work. */
function refuseWrongRole(context: Context, permission: Permission | 'anyone'): void {
	if (permission === 'anyone' || (context.actor && context.actor.kind !== 'person')) {
		return;
	}
	if (!context.actor) {
		throw new Problem('not-signed-in');
	}
	if (!can(context.actor, permission)) {
		throw new Problem('not-allowed', `The role ${context.actor.role} may not do that (${permission}).`);
	}
}
