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

function stepLine(
	{ at, name, post, channel, message }: EscalationView['steps'][number],
	index: number
): HistoryLine {
	const line = { key: `step ${index}`, at: Date.parse(at), told: true };
	if (name === null) {
		const words = m.escalations_step_nobody({ post: POST_WORDS[post]() });
		return { ...line, words, fate: null, failed: true };
	}
	const words = m.escalations_step_told_person({ name, post: POST_WORDS[post]() });
	return { ...line, words, ...fateOf(message, channel) };
}

type Fate = Record<'text' | 'call' | 'other', () => string> & { failed: boolean };

/** What the states of a text message, of a telephone call, and of what goes out in another way mean to somebody who waits for it to be heard. */
const FATES: Record<string, Fate> = {
	ready: {
		text: m.escalations_fate_waiting,
		call: m.escalations_call_waiting,
		other: m.escalations_other_waiting,
		failed: false
	},
	sending: {
		text: m.escalations_fate_sending,
		call: m.escalations_call_sending,
		other: m.escalations_other_sending,
		failed: false
	},
	accepted: {
		text: m.escalations_fate_accepted,
		call: m.escalations_call_accepted,
		other: m.escalations_other_accepted,
		failed: false
	},
	delivered: {
		text: m.escalations_fate_delivered,
		call: m.escalations_call_delivered,
		other: m.escalations_other_accepted,
		failed: false
	},
	undelivered: {
		text: m.escalations_fate_undelivered,
		call: m.escalations_call_undelivered,
		other: m.escalations_other_failed,
		failed: true
	},
	failed: {
		text: m.escalations_fate_failed,
		call: m.escalations_call_failed,
		other: m.escalations_other_failed,
		failed: true
	},
	skipped: {
		text: m.escalations_fate_skipped,
		call: m.escalations_call_skipped,
		other: m.escalations_other_skipped,
		failed: true
	},
	held: {
		text: m.escalations_fate_held,
		call: m.escalations_call_held,
		other: m.escalations_other_held,
		failed: true
	},
	cancelled: {
		text: m.escalations_fate_cancelled,
		call: m.escalations_call_cancelled,
		other: m.escalations_other_cancelled,
		failed: false
	}
};

type Channel = EscalationView['steps'][number]['channel'];

function fateOf(message: string | null, channel: Channel): { fate: string | null; failed: boolean } {
	const known = message === null ? undefined : FATES[message];
	return known ? { fate: wordsOf(known, channel), failed: known.failed } : { fate: message, failed: false };
}

function wordsOf({ text, call, other }: Fate, channel: Channel): string {
	switch (channel) {
		case 'voice':
			return call();
		case 'push':
			return m.escalations_other_way({ way: m.escalations_way_push(), fate: other() });
		case 'mail':
			return m.escalations_other_way({ way: m.escalations_way_mail(), fate: other() });
		default:
			return text();
	}
}
