import { eq } from 'drizzle-orm';
import type { Tx } from '../db';
import { pushDevices } from '../db/schema';
import type { Attempt } from '../outbox/attempts';
import type { OutboxRow } from '../outbox/change';

/**
 * What an attempt tells of its device: that its service took the message or did not, or that the device is gone, which
 * removes it. In the transaction that puts the attempt on record.
 */
export async function noteDevice(
	tx: Tx,
	{ deviceId }: OutboxRow,
	{ outcome, endedAt }: Attempt
): Promise<void> {
	if (deviceId === null) {
		return;
	}
	const device = eq(pushDevices.id, deviceId);
	if (outcome.kind === 'permanent' && outcome.reason === 'gone') {
		await tx.delete(pushDevices).where(device);
		return;
	}
	const seen = outcome.kind === 'accepted' ? { lastSuccessAt: endedAt } : { lastFailureAt: endedAt };
	await tx.update(pushDevices).set(seen).where(device);
}
