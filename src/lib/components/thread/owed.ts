/** What of a thread hangs loose, as its reader meets it. */
import type { Person } from '$lib/domain/access/actor';
import type { Nameboard } from '$lib/domain/episodes/views';
import type { ThreadView } from '$lib/domain/referrals/views';
import { asksOf, type OpenAsk, type ThreadAsk } from './asks';
import { waitingWords, waitsOn } from './waiting';

/** An ask of the thread, answered or not. */
export interface ReadAsk extends ThreadAsk {
	/** Who owes the answer and for how long, where it is open. */
	waiting: string | null;
	/** Whether the reader is to answer it on the page of its thing; a referral is answered in the thread itself. */
	mine: boolean;
}

interface Reads {
	viewer: Person;
	/** The instant of now, ms UTC. */
	now: number;
}

/** The asks of a thread, in its order. */
export function readAsks(thread: ThreadView, board: Nameboard, { viewer, now }: Reads): ReadAsk[] {
	const rowOf = (open: OpenAsk) => stands(open, thread, board);
	return asksOf(thread.items, (open) => rowOf(open)?.waits ?? null).map((ask) => {
		const { open, entry } = ask;
		const owed = open && { kind: open.kind, code: rowOf(open)?.code ?? null };
		return {
			...ask,
			waiting: owed && waitingWords(owed, entry.at, { viewer, unitId: board.unitId, now }),
			mine: owed !== null && owed.kind !== 'referral' && waitsOn(viewer, owed, board.unitId)
		};
	});
}

/** Those that hang loose: what waits on the reader before what waits on others, each oldest first. */
export function openFirst(asks: readonly ReadAsk[]): ReadAsk[] {
	const open = asks.filter((ask) => ask.open !== null);
	return [...open.filter(({ mine }) => mine), ...open.filter(({ mine }) => !mine)];
}

/** As much of an ask as tells it from another: its first line, cut at a word. */
export function opening(body: string, most = 60): string {
	const [line = ''] = body.split('\n');
	if (line.length <= most) {
		return line;
	}
	const end = line.lastIndexOf(' ', most);
	return `${line.slice(0, end > 0 ? end : most).trimEnd()} …`;
}

/** The thing behind an ask as its own row stands, where the reader may see it. */
function stands({ kind, id }: OpenAsk, thread: ThreadView, board: Nameboard) {
	if (kind === 'referral') {
		return { waits: thread.referral.state === 'asked', code: thread.referral.service };
	}
	if (kind === 'clearance') {
		const line = board.clearances.find((each) => each.id === id);
		return line ? { waits: line.state === 'asked', code: line.kind } : null;
	}
	const call = board.escalations.find((each) => each.id === id);
	return call ? { waits: call.state === 'raised', code: null } : null;
}
