/** Texts of staff: `TAKE 4829` takes an escalation, and nothing else does. */
import { words } from './reply';

export type StaffReply =
	/** `code` is null for TAKE alone: it takes the one call that was sent to this person, where it is one. */
	| { readonly kind: 'take'; readonly code: string | null }
	/** TAKE with two codes, with what is no code, or with a word that takes it back: it has to be asked back. */
	| { readonly kind: 'unclear' }
	| { readonly kind: 'other' };

const LENGTHS = [4, 5, 6];
/** Digits are quick to type in the dark. None that a hurried eye takes for a letter: no 0 and no 1. */
const DIGITS = '23456789';
const CODE = /\b\d{4,6}\b/g;
/** A code read out in pairs and typed as it was heard: `48 29`. */
const SPACED = /^\d{1,3}(?: \d{1,3})+(?!\S)/;
const REFUSAL = /\b(not|no|cannot|cant|wont|unable|dont)\b/;

/** Understand a text of staff. Case, blanks and punctuation do not matter; what follows the code may be anything but a no. */
export function readStaffReply(text: string): StaffReply {
	const plain = words(text);
	if (!/^take(?=\d| |$)/.test(plain)) {
		return { kind: 'other' };
	}
	const rest = closedUp(plain.slice('take'.length).trim());
	const [code, ...more] = new Set(rest.match(CODE) ?? []);
	if (more.length > 0 || REFUSAL.test(rest) || /\btake/.test(rest)) {
		return { kind: 'unclear' };
	}
	if (code !== undefined) {
		return { kind: 'take', code };
	}
	return rest === '' ? { kind: 'take', code: null } : { kind: 'unclear' };
}

function closedUp(rest: string): string {
	return rest.replace(SPACED, (groups) => {
		const digits = groups.replaceAll(' ', '');
		return LENGTHS.includes(digits.length) ? digits : groups;
	});
}

/**
 * A reply code that is not in use: four digits, and a longer one only when chance finds no free one of four.
 * It need not be secret, because the sender's number must be that of somebody who may take the call.
 * @param used the codes that a reply could still mean
 * @param random gives a number from 0, included, to 1, excluded
 */
export function newReplyCode(used: ReadonlySet<string>, random: () => number): string {
	for (const length of LENGTHS) {
		for (let draw = 0; draw < 50; draw += 1) {
			const code = Array.from({ length }, () => DIGITS.charAt(Math.floor(random() * DIGITS.length))).join('');
			if (!used.has(code)) {
				return code;
			}
		}
	}
	throw new Error(`No reply code is free; ${used.size} are in use.`);
}
