import { newKey, type Client } from '../support/api';

/** One write as the client knows it: sent with its key, answered or not. */
export interface Write {
	key: string;
	body: string;
	threadId: string;
	/** The entry's id from the first success; null while no answer came. */
	answered: string | null;
}

/**
 * Post entries one after the other until told to stop. A write that gets no answer (the server was killed) stays
 * unanswered; it is sent again later with the same key, as any client does.
 */
export async function postUntil(
	client: Client,
	threadId: string,
	name: string,
	stopped: () => boolean,
	log: Write[]
): Promise<void> {
	for (let n = 0; !stopped(); n += 1) {
		const write: Write = { key: newKey(), body: `${name} says ${n}`, threadId, answered: null };
		log.push(write);
		await send(client, write);
		if (write.answered === null) {
			return;
		}
	}
}

/** Send a write once. Anything but a success or a lost connection is a failure of the test. */
export async function send(client: Client, write: Write): Promise<void> {
	let answer;
	try {
		answer = await client.post(
			`/api/threads/${write.threadId}/entries`,
			{ body: write.body },
			{ 'idempotency-key': write.key }
		);
	} catch {
		return;
	}
	if (answer.status !== 201) {
		throw new Error(`An entry was answered ${answer.status}: ${answer.text}`);
	}
	const id = String(answer.body.id);
	if (write.answered !== null && write.answered !== id) {
		throw new Error(`The key ${write.key} had the answer ${write.answered} and now has ${id}.`);
	}
	write.answered = id;
}
