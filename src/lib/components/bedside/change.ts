import { plain } from '$lib/domain/bedside/numbers';
import { m } from '$lib/i18n/paraglide/messages';
import type { Posture } from '$lib/domain/bedside/codes';
import type { DraftReading } from './draft';
import { valueOf, type ReadingField } from './fields';

/** Values whose change against the reading before says something at a glance. */
const COMPARED: readonly ReadingField[] = ['sbp', 'dbp', 'hr', 'spo2'];

/** The value before, as it stands beside a later one; empty where the two were not taken alike. */
export function baseText(field: ReadingField, before: DraftReading, reading: DraftReading): string {
	const value = valueOf(field, before.texts[field]);
	return value === null || !isComparable(field, before, reading) ? '' : plain(value);
}

/** `fell 20`, `rose 10`, `same`; null where there is nothing to compare. The rules judge by themselves. */
export function changeWords(field: ReadingField, before: DraftReading, reading: DraftReading): string | null {
	const [from, to] = [valueOf(field, before.texts[field]), valueOf(field, reading.texts[field])];
	if (from === null || to === null || !COMPARED.includes(field) || !isComparable(field, before, reading)) {
		return null;
	}
	if (to === from) {
		return m.bedside_same();
	}
	const by = plain(Math.abs(to - from));
	return to > from ? m.bedside_rose({ by }) : m.bedside_fell({ by });
}

/** Taken in the same posture, and pressures from the same source; what is not stated counts as unchanged. */
function isComparable(field: ReadingField, before: DraftReading, reading: DraftReading): boolean {
	const pressure = field === 'sbp' || field === 'dbp';
	return isSame(before.posture, reading.posture) && (!pressure || isSame(before.bpSource, reading.bpSource));
}

function isSame<T>(one: T | null, other: T | null): boolean {
	return one === null || other === null || one === other;
}

/**
 * The two postures where a reading was taken in another than the one before; without a rest in the new one the rules
 * compare only the first pressure after rising. Null where they are the same, or one was not stated.
 */
export function unlikePostures(
	before: DraftReading,
	reading: DraftReading
): { before: Posture; now: Posture } | null {
	return before.posture !== null && reading.posture !== null && before.posture !== reading.posture
		? { before: before.posture, now: reading.posture }
		: null;
}
