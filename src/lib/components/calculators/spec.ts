/** What a calculator of the page is made of: its fields, how they are checked, and what it says. */
import type { z } from 'zod';
import { doubtAbout } from '$lib/domain/calculators/doubts';
import { m } from '$lib/i18n/paraglide/messages';

export interface CalculatorField {
	/** The name of the field in the body that is checked. */
	readonly name: string;
	readonly label: string;
	readonly unit?: string;
	/** Left out for a number that is typed. */
	readonly options?: readonly { value: string; label: string }[];
	/** What stands in the field at first; empty where left out. */
	readonly initial?: string;
}

export interface ResultLine {
	readonly label: string;
	readonly value: string;
}

export interface Result {
	/** The answer in large. */
	readonly head: string;
	readonly lines: readonly ResultLine[];
	/** What limits the answer: outside its range, an estimate, a method with its error. */
	readonly notes: readonly string[];
}

/** Typed texts by the name of their field. */
export type Typed = Readonly<Record<string, string>>;

export interface CalculatorSpec {
	readonly id: string;
	readonly title: string;
	/** What stands beside the numbers, always. */
	readonly cautions: readonly string[];
	/** The fields that what was chosen so far asks for. */
	fields(typed: Typed): readonly CalculatorField[];
	/** The answer, what is wrong with a field, or nothing while something needed is still empty. */
	work(typed: Typed): Worked;
}

export type Worked =
	| { readonly kind: 'result'; readonly result: Result }
	| { readonly kind: 'faults'; readonly faults: Readonly<Record<string, string>> }
	| { readonly kind: 'open'; readonly lacking: readonly string[] };

/**
 * Check what was typed against the schema of the API, and work it out.
 * @param body what was typed in the shape of the body: see `numbersOf`
 */
export function workOut<T>(schema: z.ZodType<T>, body: unknown, answer: (input: T) => Result): Worked {
	const parsed = schema.safeParse(body);
	if (parsed.success) {
		return { kind: 'result', result: answer(parsed.data) };
	}
	const faults: Record<string, string> = {};
	const lacking: string[] = [];
	for (const { path, message } of parsed.error.issues) {
		const field = String(path[0] ?? '');
		if (isEmpty(body, field)) {
			lacking.push(field);
		} else {
			faults[field] ??= message;
		}
	}
	return Object.keys(faults).length > 0 ? { kind: 'faults', faults } : { kind: 'open', lacking };
}

function isEmpty(body: unknown, field: string): boolean {
	return (body as Record<string, unknown>)[field] === undefined;
}

/** The typed texts with numbers in place of what reads as one; what is empty is left out, other text stays text. */
export function numbersOf(typed: Typed): Record<string, number | string> {
	const filled = Object.entries(typed).filter(([, text]) => text.trim() !== '');
	return Object.fromEntries(filled.map(([name, text]) => [name, numberOf(text) ?? text]));
}

function numberOf(text: string): number | null {
	const plain = text.trim().replace(',', '.');
	return /^-?\d+(\.\d+)?$/.test(plain) ? Number(plain) : null;
}

/** What a field asks about its value once more; null where it is usual, or no number. */
export function doubtOf(name: string, text: string): string | null {
	const value = numberOf(text);
	const usual = value === null ? null : doubtAbout(name, value);
	return usual && m.calculators_doubt({ value: text.trim(), ...usual });
}

/** A figure as a page shows it; never more digits than it deserves. */
export function figure(value: number, digits: number): string {
	return value.toFixed(digits);
}
