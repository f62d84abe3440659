/**
 * How long a text message is and in how many parts it travels.
 *
 * One part holds 140 octets: 160 septets, or 70 units of UCS-2. Of several parts each loses 6 octets to the
 * header that joins them: 153 septets or 67 units. Source: 3GPP TS 23.038 and 23.040; the counts of units per
 * part follow from 134 octets.
 */
import { septetsOf } from './gsm7';

export interface SmsLength {
	readonly encoding: 'gsm7' | 'ucs2';
	/** Septets, or 16 bit units. */
	readonly units: number;
	readonly segments: number;
}

const ROOM = { gsm7: { single: 160, part: 153 }, ucs2: { single: 70, part: 67 } } as const;

/** Measure a text. An empty one has no units and no segments. */
export function measureSms(text: string): SmsLength {
	const characters = [...text];
	const septets = characters.map(septetsOf);
	// One character outside the alphabet moves the whole message to UCS-2.
	const encoding = septets.includes(null) ? 'ucs2' : 'gsm7';
	const sizes =
		encoding === 'gsm7' ? septets.map((size) => size ?? 0) : characters.map(({ length }) => length);
	const units = sizes.reduce((sum, size) => sum + size, 0);
	return { encoding, units, segments: countSegments(sizes, units, ROOM[encoding]) };
}

/** Whether the text travels in one part. */
export function isOneSegment(text: string): boolean {
	return measureSms(text).segments === 1;
}

/** An escape and its septet, or the halves of a surrogate pair, stay in one part: room may be left over. */
function countSegments(
	sizes: readonly number[],
	units: number,
	room: { single: number; part: number }
): number {
	if (units === 0) {
		return 0;
	}
	if (units <= room.single) {
		return 1;
	}
	let segments = 1;
	let used = 0;
	for (const size of sizes) {
		if (used + size > room.part) {
			segments += 1;
			used = 0;
		}
		used += size;
	}
	return segments;
}
