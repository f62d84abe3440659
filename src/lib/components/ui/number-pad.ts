export type PadKey = '0' | '1' | '2' | '3' | '4' | '5' | '6' | '7' | '8' | '9' | 'point' | 'erase';

interface Pad {
	readonly decimals: boolean;
	/** Most digits before the point. */
	readonly digits: number;
	/** What the reader's language writes before a fraction: a point or a comma. */
	readonly point: string;
}

/**
 * The text after one key. A digit too many, a second point and a point where there is no fraction change nothing;
 * one digit follows the point, as the readings of the bedside have; a leading 0 gives way.
 */
export function pressed(text: string, key: PadKey, { decimals, digits, point }: Pad): string {
	if (key === 'erase') {
		return text.slice(0, -1);
	}
	if (key === 'point') {
		return decimals && !/[.,]/.test(text) ? `${text || '0'}${point}` : text;
	}
	const [whole = '', fraction] = text.split(/[.,]/);
	if (fraction !== undefined) {
		return fraction === '' ? text + key : text;
	}
	const next = whole === '0' ? key : whole + key;
	return next.length > digits ? text : next;
}
