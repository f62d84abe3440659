import type { PageLinkLine } from '$lib/domain/patient-page/views';
import { m } from '$lib/i18n/paraglide/messages';
import type { FateWords } from './fates';

/** What became of the message that carried a link, and whether somebody has to reach the patient another way. */
const FATES: Record<string, { words: () => string; alarming: boolean }> = {
	ready: { words: m.visits_link_waiting, alarming: false },
	sending: { words: m.visits_link_waiting, alarming: false },
	accepted: { words: m.visits_link_sent, alarming: false },
	delivered: { words: m.visits_link_delivered, alarming: false },
	undelivered: { words: m.visits_link_undelivered, alarming: true },
	failed: { words: m.visits_link_failed, alarming: true },
	skipped: { words: m.visits_link_skipped, alarming: true },
	held: { words: m.visits_link_held, alarming: true },
	cancelled: { words: m.visits_link_cancelled, alarming: true }
};

/** The fate of a link's message in words; a state of which there are no words is shown as the log has it. */
export function linkFate({ message }: Pick<PageLinkLine, 'message'>): FateWords {
	const known = FATES[message];
	return known ? { words: known.words(), alarming: known.alarming } : { words: message, alarming: true };
}
