/** The letter of iCalendar, RFC 5545: escaped text, lines of at most 75 octets, CRLF at their ends. */
import type { Instant } from '../core/time';

const FOLD_OCTETS = 75;
const encoder = new TextEncoder();

/** A value of type TEXT, section 3.3.11. What has no place in a line, a control character, becomes a space. */
export function escapeText(text: string): string {
	return text
		.replace(/\\/g, '\\\\')
		.replace(/;/g, '\\;')
		.replace(/,/g, '\\,')
		.replace(/\r\n|\r|\n/g, '\\n')
		.replace(/\p{Cc}/gu, ' ');
}

/** A value of a parameter in quotation marks, section 3.2: it cannot hold such a mark. */
export function quoted(text: string): string {
	return `"${text.replace(/["\p{Cc}]/gu, ' ').trim()}"`;
}

/** An instant in UTC, section 3.3.5, form 2: `20250328T100000Z`. It needs no definition of a zone. */
export function utcStamp(at: Instant): string {
	return new Date(at)
		.toISOString()
		.replace(/\.\d{3}/, '')
		.replace(/[-:]/g, '');
}

/** A line folded as section 3.1 wants it: no part is longer than 75 octets, and no character is cut in two. */
export function folded(line: string): string {
	const parts: string[] = [];
	let part = '';
	let octets = 0;
	for (const character of line) {
		const size = encoder.encode(character).length;
		if (octets + size > FOLD_OCTETS) {
			parts.push(part);
			part = ' ';
			octets = 1;
		}
		part += character;
		octets += size;
	}
	return [...parts, part].join('\r\n');
}

/** All lines of a file, folded and ended. */
export function fileOf(lines: readonly string[]): string {
	return lines.map((line) => `${folded(line)}\r\n`).join('');
}
