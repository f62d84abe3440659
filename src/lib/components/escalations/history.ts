import type { EscalationMoveKind } from '$lib/domain/core/codes';
import type { EscalationView } from '$lib/domain/escalations/views';
import { m } from '$lib/i18n/paraglide/messages';
import { POST_WORDS } from '$lib/components/clock/chain-rope';

/** One line of the history. */
export interface HistoryLine {
	key: string;
	/** Milliseconds UTC. */
	at: number;
	words: string;
	/** Somebody was told, or should have been; else a person did something. */
	told: boolean;
	/** By which channel and what became of the message; null where there is none. */
	fate: string | null;
	/** The message did not reach its reader, or nobody was there to be told. */
	failed: boolean;
}

/** Moves and messages in order of time; at the same instant the move first, because it caused the messages. */
export function historyOf({ moves, steps }: Pick<EscalationView, 'moves' | 'steps'>): HistoryLine[] {
	const done = moves.map((move, index) => moveLine(move, index));
	const told = steps.map((step, index) => stepLine(step, index));
	return [...done, ...told].sort((a, b) => a.at - b.at);
}

type MoveWords = { name: string; other: string; minutes: number };
const MOVE_WORDS: Record<EscalationMoveKind, (words: MoveWords) => string> = {
	raised: m.escalations_move_raised,
	'told-in-person': m.escalations_move_told_in_person,
	added: m.escalations_move_added,
	taken: m.escalations_move_taken,
	untaken: m.escalations_move_untaken,
	eta: m.escalations_move_eta,
	asked: m.escalations_move_asked,
	'went-on': m.escalations_move_went_on,
	'out-of-reach': m.escalations_move_out_of_reach,
	arrived: m.escalations_move_arrived,
	passed: m.escalations_move_passed,
	confirmed: m.escalations_move_confirmed,
	settled: m.escalations_move_settled,
	informed: m.escalations_move_informed,
	withdrawn: m.escalations_move_withdrawn
};

function moveLine(move: EscalationView['moves'][number], index: number): HistoryLine {
	const { at, by, kind, other, etaMinutes } = move;
	const words = MOVE_WORDS[kind]({
		name: by ?? m.escalations_by_nobody(),
		other: other ?? m.escalations_somebody(),
		minutes: etaMinutes ?? 0
	});
	return { key: `move ${index}`, at: Date.parse(at), words, told: false, fate: null, failed: false };
}

function stepLine({ at, name, post, message }: EscalationView['steps'][number], index: number): HistoryLine {
	const line = { key: `step ${index}`, at: Date.parse(at), told: true };
	if (name === null) {
		const words = m.escalations_step_nobody({ post: POST_WORDS[post]() });
		return { ...line, words, fate: null, failed: true };
	}
	const words = m.escalations_step_told_person({ name, post: POST_WORDS[post]() });
	return { ...line, words, ...fateOf(message) };
}

/** What the states of a message mean to somebody who waits for it to be read. */
const FATES: Record<string, { words: () => string; failed: boolean }> = {
	ready: { words: m.escalations_fate_waiting, failed: false },
	sending: { words: m.escalations_fate_sending, failed: false },
	accepted: { words: m.escalations_fate_accepted, failed: false },
	delivered: { words: m.escalations_fate_delivered, failed: false },
	undelivered: { words: m.escalations_fate_undelivered, failed: true },
	failed: { words: m.escalations_fate_failed, failed: true },
	skipped: { words: m.escalations_fate_skipped, failed: true },
	held: { words: m.escalations_fate_held, failed: true },
	cancelled: { words: m.escalations_fate_cancelled, failed: false }
};

function fateOf(message: string | null): { fate: string | null; failed: boolean } {
	const known = message === null ? undefined : FATES[message];
	return known ? { fate: known.words(), failed: known.failed } : { fate: message, failed: false };
}
