/**
 * Which figures of a calculator are asked about once more: possible, and unusual. They are worked with all the same.
 * Plausible ranges, from memory: each hospital confirms its own.
 */
import { BOUNDS } from '../bedside';
import { CALCULATOR_BOUNDS as OURS } from './bounds';

interface Usual {
	readonly low: number;
	readonly high: number;
	readonly unit: string;
}

const usual = ({ confirm, unit }: { confirm: readonly [number, number]; unit: string }): Usual => ({
	low: confirm[0],
	high: confirm[1],
	unit
});

/** By the name of the field; what is not here is never asked about. */
const USUAL: Readonly<Record<string, Usual>> = {
	hr: usual(BOUNDS.hr),
	pulse: usual(BOUNDS.hr),
	resting: usual(BOUNDS.hr),
	sbp: usual(BOUNDS.sbp),
	beforeSbp: usual(BOUNDS.sbp),
	afterSbp: usual(BOUNDS.sbp),
	dbp: usual(BOUNDS.dbp),
	beforeDbp: usual(BOUNDS.dbp),
	afterDbp: usual(BOUNDS.dbp),
	spo2: usual(BOUNDS.spo2),
	rr: usual(BOUNDS.rr),
	temperature: usual(BOUNDS.temperature),
	age: usual(OURS.ageYears),
	ageYears: usual(OURS.ageYears),
	heightCm: usual(OURS.heightCm),
	weightKg: usual(OURS.weightKg),
	distanceM: usual(OURS.walkedM),
	beforeM: usual(OURS.walkedM),
	afterM: usual(OURS.walkedM),
	ejectionFraction: usual(OURS.ejectionFraction),
	mets: usual(OURS.mets)
};

/** The usual range of a field whose value lies outside it; null where there is nothing to ask. */
export function doubtAbout(field: string, value: number): Usual | null {
	const range = USUAL[field];
	return range && (value < range.low || value > range.high) ? range : null;
}
