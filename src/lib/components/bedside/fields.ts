import { readNumber } from '$lib/domain/core/typed-number';
import { BOUNDS, needsConfirming, type BoundedField } from '$lib/domain/bedside/bounds';
import { m } from '$lib/i18n/paraglide/messages';

/** What is measured at the bedside, in the order it is usually read off; `work` in effort alone. */
export const READING_FIELDS = ['sbp', 'dbp', 'hr', 'spo2', 'rr', 'rpe', 'pain', 'oxygenLpm', 'work'] as const;
export type ReadingField = (typeof READING_FIELDS)[number];

/** What stands in a field. Only `fine` and `doubtful` carry a value that may be judged. */
export type Checked =
	{ kind: 'empty' | 'unreadable' } | { kind: 'impossible' | 'doubtful' | 'fine'; value: number };

/** Read a field as typed: outside the hard bounds it is a slip of the finger, outside the usual range a question. */
export function checkField(field: BoundedField, text: string): Checked {
	const read = readNumber(text);
	if (read.kind !== 'number') {
		return read;
	}
	const { value } = read;
	const { low, high } = BOUNDS[field];
	if (value < low || value > high) {
		return { kind: 'impossible', value };
	}
	return { kind: needsConfirming(field, value) ? 'doubtful' : 'fine', value };
}

/** The number of a field, or null when there is none that may be judged. */
export function valueOf(field: BoundedField, text: string | undefined): number | null {
	const checked = checkField(field, text ?? '');
	return checked.kind === 'fine' || checked.kind === 'doubtful' ? checked.value : null;
}

/** Why a field cannot be taken as it is; null when it can, or when it is only doubtful. */
export function faultWords(field: BoundedField, text: string): string | null {
	const checked = checkField(field, text);
	if (checked.kind === 'unreadable') {
		return m.common_not_a_number();
	}
	if (checked.kind !== 'impossible') {
		return null;
	}
	const { low, high, unit } = BOUNDS[field];
	// A pulse read off the same screen is the usual slip here.
	if (field === 'spo2' && checked.value > high && checked.value <= BOUNDS.hr.high) {
		return m.bedside_fault_pulse_in_saturation({ value: checked.value });
	}
	return m.bedside_fault_bounds({ value: checked.value, low, high, unit });
}

/** The question about a doubtful value; null when there is none to ask. */
export function doubtWords(field: BoundedField, text: string): string | null {
	const checked = checkField(field, text);
	const range = BOUNDS[field].confirm;
	if (checked.kind !== 'doubtful' || range === null) {
		return null;
	}
	return m.bedside_doubt({ value: checked.value, low: range[0], high: range[1] });
}
