import type { Person } from '$lib/domain/access/actor';
import { readStaffReply } from '$lib/domain/messages/reply';
import type { Tx } from '../db';
import { answerTo, type ReceivedText, type Understood } from './understood';

/**
 * What a text of staff does. An escalation cannot be taken by a text yet, so whoever tries is told at once that it
 * is not theirs; the chain goes on meanwhile. Everything else is kept for a person to read.
 */
export function onStaffText(_tx: Tx, person: Person, text: ReceivedText): Promise<Understood> {
	if (readStaffReply(text.body).kind === 'other') {
		return Promise.resolve({ understoodAs: 'staff', handled: false });
	}
	const answer = answerTo(text, { userId: person.id }, 'staff-unclear', {});
	return Promise.resolve({ understoodAs: 'staff', handled: true, change: { messages: [answer] } });
}
