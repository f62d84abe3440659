import { headline, isInForce, type ClearanceHeadline } from '$lib/domain/clearances/states';
import { kindsIn, type Phase } from '$lib/domain/clearances/kinds';
import type { ClearanceKind } from '$lib/domain/core/codes';
import type { ClearanceLine } from '$lib/domain/episodes/views';
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
	/** Whether sternal precautions hold. */
	sternal: boolean;
	/** The hospital's date, `YYYY-MM-DD`. */
	today: string;
}

/**
 * How a clearance stands: what is past its review date, or counts from an earlier operation, permits nothing,
 * whatever its state says.
 */
export function standingOf({ kind, line, sternal, today }: Judged): Standing {
	if (line !== null && line.current && isInForce(line, today)) {
		return { headline: headline(line.state), why: null };
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
	/** The one that counts: the newest ask. Null where nobody has asked. */
	newest: ClearanceLine | null;
	/** The asks before it, newest first. */
	earlier: ClearanceLine[];
}

/**
 * Every kind that means something in the phase, in the order of recovery, each with its asks.
 * @param lines newest ask first
 */
export function byKind(lines: readonly ClearanceLine[], phase: Phase = 'inpatient'): KindHistory[] {
	return kindsIn(phase).map((kind) => {
		const [newest = null, ...earlier] = lines.filter((line) => line.kind === kind);
		return { kind, newest, earlier };
	});
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
