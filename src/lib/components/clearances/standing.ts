import { headline, isInForce, type ClearanceHeadline } from '$lib/domain/clearances/states';
import { kindsIn, type Phase } from '$lib/domain/clearances/kinds';
import type { ClearanceKind } from '$lib/domain/core/codes';
import type { ClearanceLine } from '$lib/domain/episodes/views';
import { DEFAULT_LOCALE } from '$lib/format';
import { CLEARANCE_WORDS, HEADLINE_WORDS } from '$lib/i18n/labels';
import { m } from '$lib/i18n/paraglide/messages';

/** How a kind of activity stands today. */
export interface Standing {
	/** Null where nobody's word is needed: the level or the operation decides. */
	headline: ClearanceHeadline | null;
	/** Why it is not cleared, or what decides, in the words that stand below the headline; null where it is. */
	why: string | null;
}

export interface Judged {
	kind: ClearanceKind;
	/** The newest ask of the kind; null where nobody has asked. */
	line: Pick<ClearanceLine, 'state' | 'reviewOn' | 'current'> | null;
	/** How the last decision before an open ask stands: asking again opens no door. Null where there is none. */
	before?: ClearanceLine['state'] | null;
	/** Whether sternal precautions hold. */
	sternal: boolean;
	/** The hospital's date, `YYYY-MM-DD`. */
	today: string;
}

/**
 * How a clearance stands: what is past its review date, or counts from an earlier operation, permits nothing,
 * whatever its state says.
 */
export function standingOf({ kind, line, before = null, sternal, today }: Judged): Standing {
	if (line !== null && line.current && isInForce(line, today)) {
		return { headline: headline(line.state), why: null };
	}
	if (line?.current && line.state === 'asked' && before !== null && !before.startsWith('given')) {
		return { headline: 'not-cleared', why: `${whyNot(before)} · ${m.clearances_why_asked()}` };
	}
	if (line === null || !line.current || line.state === 'asked') {
		const why = whyUndecided(line);
		const otherwise = decidedOtherwise(kind, sternal);
		return otherwise === null
			? { headline: 'not-cleared', why }
			: { headline: null, why: line === null ? otherwise : `${otherwise} · ${why}` };
	}
	return { headline: 'not-cleared', why: whyNot(line.state) };
}

/** What decides as long as nobody has given or refused: the same as the bedside rules and 'may do now' go by. */
function decidedOtherwise(kind: ClearanceKind, sternal: boolean): string | null {
	switch (kind) {
		case 'out-of-bed':
		case 'corridor':
			return m.clearances_why_level();
		case 'arm-stage':
		case 'precautions-end':
			return sternal ? null : m.patient_no_precautions();
		case 'stairs':
		case 'oral-intake':
		case 'treadmill':
		case 'discharge':
			return null;
	}
}

function whyUndecided(line: Judged['line']): string {
	if (line === null) {
		return m.clearances_why_not_asked();
	}
	return line.current ? m.clearances_why_asked() : m.clearances_why_earlier_operation();
}

function whyNot(state: ClearanceLine['state']): string {
	switch (state) {
		case 'asked':
			return m.clearances_why_asked();
		case 'withheld':
			return m.clearances_state_withheld();
		case 'on-hold':
			return m.clearances_state_on_hold();
		case 'withdrawn':
			return m.clearances_state_withdrawn();
		case 'given':
		case 'given-with-limits':
		case 'lapsed':
			return m.clearances_why_lapsed();
	}
}

/** One kind with all its asks. */
export interface KindHistory {
	kind: ClearanceKind;
	/** The one that counts: the newest ask that was not taken back undecided. Null where there is none. */
	newest: ClearanceLine | null;
	/** All others, newest first. */
	earlier: ClearanceLine[];
	/** How the last decision before the newest ask stands, for {@link standingOf}. */
	before: ClearanceLine['state'] | null;
}

/**
 * Every kind that means something in the phase, in the order of recovery, each with its asks.
 * @param lines newest ask first
 */
export function byKind(lines: readonly ClearanceLine[], phase: Phase = 'inpatient'): KindHistory[] {
	return kindsIn(phase).map((kind) => {
		const own = lines.filter((line) => line.kind === kind);
		const [newest = null, ...older] = own.filter((line) => !isTakenBack(line));
		const decided = older.find((line) => line.current && line.state !== 'asked');
		return {
			kind,
			newest,
			earlier: own.filter((line) => line !== newest),
			before: decided?.state ?? null
		};
	});
}

/** Whoever asked took the ask back before anybody decided: it says nothing about the patient. */
function isTakenBack({ state, decidedBy }: ClearanceLine): boolean {
	return state === 'withdrawn' && decidedBy === null;
}

/** The kinds that nobody has asked for, one line for each way in which they stand: `Not cleared, not yet asked: stairs`. */
export function unaskedWords(kinds: readonly ClearanceKind[], sternal: boolean, today: string): string[] {
	const lines = new Map<string, string[]>();
	for (const kind of kinds) {
		const { headline: head, why } = standingOf({ kind, line: null, sternal, today });
		const stands = [head === null ? '' : HEADLINE_WORDS[head](), why ?? ''].filter(Boolean).join(', ');
		lines.set(stands, [...(lines.get(stands) ?? []), CLEARANCE_WORDS[kind]().toLowerCase()]);
	}
	const list = new Intl.ListFormat(DEFAULT_LOCALE);
	return [...lines].map(([stands, names]) =>
		m.clearances_unasked({
			stands: stands.charAt(0).toUpperCase() + stands.slice(1),
			kinds: list.format(names)
		})
	);
}

/** The kinds that can be asked for now: neither open nor in force. */
export function askable(lines: readonly ClearanceLine[], today: string): ClearanceKind[] {
	return byKind(lines)
		.filter(({ newest }) => newest === null || !standsInTheWay(newest, today))
		.map(({ kind }) => kind);
}

/** The rule of the server: one of a kind is open, on hold or in force, and counts from the latest operation. */
function standsInTheWay(line: ClearanceLine, today: string): boolean {
	const open = line.state === 'asked' || line.state === 'on-hold' || line.state.startsWith('given');
	const past = line.reviewOn !== null && line.reviewOn < today;
	return open && line.current && !past;
}
