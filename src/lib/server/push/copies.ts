import { asc, eq } from 'drizzle-orm';
import type { Tx } from '../db';
import { escalationSteps, pushDevices } from '../db/schema';
import { newId } from '../ids';
import type { NewMessage } from '../outbox/enqueue';

const BESIDE = ':push:';

/** The key of the notice that goes to a device beside a text of that key; `%` stands for any device. */
export function noticeKey(textKey: string, deviceId: string): string {
	return textKey + BESIDE + deviceId;
}

/** The key of the text that a notice goes beside. */
export function textKeyOf(key: string): string {
	return key.split(BESIDE)[0] ?? key;
}

/**
 * The notices that go beside a text, at once and not after it: one to each device of its reader. Where the text stands
 * in the history of a call for help, they stand beside it.
 */
export async function copiesFor(tx: Tx, text: NewMessage & { id: string }): Promise<NewMessage[]> {
	const { notice, userId } = text;
	if (!notice || userId === undefined || text.channel !== 'sms') {
		return [];
	}
	const devices = await tx
		.select({ id: pushDevices.id })
		.from(pushDevices)
		.where(eq(pushDevices.userId, userId))
		.orderBy(asc(pushDevices.createdAt), asc(pushDevices.id));
	const copies = devices.map(({ id }) => copyFor(text, notice, id));
	for (const { id } of copies) {
		await standBeside(tx, text.id, id);
	}
	return copies;
}

function copyFor(
	{ kind, causeKey, userId, linkId, ref, notBefore, expiresAt }: NewMessage,
	{ subject, text }: { subject: string; text: string },
	deviceId: string
): NewMessage & { id: string } {
	return {
		...{ id: newId(), channel: 'push', causeKey: noticeKey(causeKey, deviceId), deviceId },
		...{ kind, userId, linkId, ref, notBefore, expiresAt, subject, body: text }
	};
}

async function standBeside(tx: Tx, textId: string, messageId: string): Promise<void> {
	const [told] = await tx.select().from(escalationSteps).where(eq(escalationSteps.messageId, textId));
	if (told) {
		await tx.insert(escalationSteps).values({ ...told, id: newId(), channel: 'push', messageId });
	}
}
