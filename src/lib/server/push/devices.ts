import { and, desc, eq, or } from 'drizzle-orm';
import type { AuditEvent } from '$lib/domain/audit/actions';
import { invalidField, notFound, Problem } from '$lib/domain/core/errors';
import { MINUTE } from '$lib/domain/core/time';
import { STAFF_NOTICES } from '$lib/domain/messages/templates';
import { DEVICES_MAX, isAllowedEndpoint, type DeviceKind, type DeviceLine } from '$lib/domain/push/devices';
import type { DeviceBody } from '$lib/domain/push/forms';
import type { PersonContext } from '../context';
import { db, type Tx } from '../db';
import { pushDevices } from '../db/schema';
import { env } from '../env';
import { newId } from '../ids';
import { write, type Written } from '../write';

/** A trial that is not there by then has failed. */
const TRIAL_LIFE_MS = 2 * MINUTE;

/** The devices on which a person has notices, the newest first. @param here the digest of the browser that asks */
export async function devicesOf({ actor }: PersonContext, here: string | null): Promise<DeviceLine[]> {
	const rows = await db()
		.select()
		.from(pushDevices)
		.where(eq(pushDevices.userId, actor.id))
		.orderBy(desc(pushDevices.createdAt), desc(pushDevices.id));
	return rows.map(({ id, kind, createdAt, lastSuccessAt, lastFailureAt, tokenHash }) => ({
		...{ id, kind, createdAt, lastSuccessAt, lastFailureAt },
		here: tokenHash === here
	}));
}

/** What is known of the browser that turns its notices on. */
export interface Browser {
	kind: DeviceKind;
	/** The digest of its mark. */
	tokenHash: string;
	signInId: string | null;
}

/**
 * Show notices on a device from now on. The same browser turned on again, or by somebody else, is one device still: it
 * shows what is for whoever turned it on last.
 * @throws Problem `invalid` at `/endpoint` for a service that the hospital does not know, `wrong-state` without keys of
 * our own, or with too many devices
 */
export async function addDevice(
	context: PersonContext,
	{ endpoint, keys }: DeviceBody,
	browser: Browser
): Promise<Written<{ id: string }>> {
	requireAllowed(endpoint);
	return write(context, 'own-account.change', async (tx) => {
		const { actor, now } = context;
		const same = or(eq(pushDevices.endpoint, endpoint), eq(pushDevices.tokenHash, browser.tokenHash));
		await tx.delete(pushDevices).where(same);
		if ((await tx.$count(pushDevices, eq(pushDevices.userId, actor.id))) >= DEVICES_MAX) {
			throw new Problem(
				'wrong-state',
				`Notices are on on ${DEVICES_MAX} devices: turn one of them off first.`
			);
		}
		const id = newId();
		await tx
			.insert(pushDevices)
			.values({ id, userId: actor.id, endpoint, ...keys, ...browser, createdAt: now });
		return { result: { id }, audit: onRecord('account.device-added', id) };
	});
}

function requireAllowed(endpoint: string): void {
	const { push } = env();
	if (push === null) {
		throw new Problem('wrong-state', 'No keys for notices are set up here.');
	}
	if (!isAllowedEndpoint(endpoint, push.hosts)) {
		throw invalidField('/endpoint', 'The endpoint: its push service is none that this hospital allows.');
	}
}

/** Show none there any more. @throws Problem `not-found` for one that is not theirs */
export async function removeDevice(context: PersonContext, id: string): Promise<void> {
	await write(context, 'own-account.change', async (tx) => {
		const own = and(eq(pushDevices.id, id), eq(pushDevices.userId, context.actor.id));
		const removed = await tx.delete(pushDevices).where(own).returning({ id: pushDevices.id });
		if (removed.length === 0) {
			throw notFound('device');
		}
		return { result: { id }, audit: onRecord('account.device-removed', id) };
	});
}

/** Send a device of one's own a notice, to see whether it arrives. */
export async function tryDevice(context: PersonContext, id: string): Promise<void> {
	await write(context, 'own-account.change', async (tx) => {
		const { actor, now } = context;
		const own = and(eq(pushDevices.id, id), eq(pushDevices.userId, actor.id));
		if ((await tx.$count(pushDevices, own)) === 0) {
			throw notFound('device');
		}
		const messageId = newId();
		const { subject, text } = STAFF_NOTICES.trial.en({});
		const trial = {
			...({ id: messageId, kind: 'trial', channel: 'push', causeKey: `trial:${messageId}` } as const),
			...{ userId: actor.id, deviceId: id, subject, body: text },
			...{ ref: { kind: 'account' as const, id: actor.id }, expiresAt: now + TRIAL_LIFE_MS }
		};
		return { result: { id: messageId }, audit: onRecord('account.device-tried', id), messages: [trial] };
	});
}

function onRecord(
	action: 'account.device-added' | 'account.device-removed' | 'account.device-tried',
	objectId: string
): AuditEvent {
	return { action, objectKind: 'device', objectId };
}

/**
 * Somebody signs in in this browser: notices of somebody else end there, their own belong to the new sign-in.
 * @param here the digest of the browser's mark; null for one without
 */
export async function takeOverDevice(
	tx: Tx,
	here: string | null,
	userId: string,
	signInId: string
): Promise<AuditEvent[]> {
	const [device] =
		here === null ? [] : await tx.select().from(pushDevices).where(eq(pushDevices.tokenHash, here));
	if (device?.userId === userId) {
		await tx.update(pushDevices).set({ signInId }).where(eq(pushDevices.id, device.id));
		return [];
	}
	return endDevice(tx, here);
}

/** Whoever was signed in in this browser leaves it: it shows no notices of theirs any more. */
export async function endDevice(tx: Tx, here: string | null): Promise<AuditEvent[]> {
	if (here === null) {
		return [];
	}
	const ended = await tx
		.delete(pushDevices)
		.where(eq(pushDevices.tokenHash, here))
		.returning({ id: pushDevices.id });
	return ended.map(({ id }) => onRecord('account.device-removed', id));
}

export async function isDevice(here: string): Promise<boolean> {
	return (await db().$count(pushDevices, eq(pushDevices.tokenHash, here))) > 0;
}
