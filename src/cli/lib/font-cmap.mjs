/** @typedef {import('./font-file.mjs').Tables} Tables */

/**
 * Every letter that the font has a glyph for, read from the part of `cmap` in format 4, which ends at U+FFFF.
 * @param {Tables} tables
 * @returns {Set<number>} code points
 */
export function lettersOf(tables) {
	const cmap = tables.cmap ?? Buffer.alloc(4);
	const subtables = Array.from({ length: cmap.readUInt16BE(2) }, (_, at) => cmap.readUInt32BE(8 + 8 * at));
	const table = subtables.map((start) => cmap.subarray(start)).find((part) => part.readUInt16BE(0) === 4);
	return new Set(table ? segmentsOf(table).flatMap((segment) => lettersIn(table, segment)) : []);
}

/** @param {Buffer} table */
function segmentsOf(table) {
	const size = table.readUInt16BE(6);
	return Array.from({ length: size / 2 }, (_, at) => {
		const [end, start, delta, range] = [14, 16 + size, 16 + 2 * size, 16 + 3 * size].map(
			(place) => place + 2 * at
		);
		return { end: end ?? 0, start: start ?? 0, delta: delta ?? 0, range: range ?? 0 };
	});
}

/**
 * @param {Buffer} table
 * @param {{ end: number, start: number, delta: number, range: number }} segment where its fields stand
 */
function lettersIn(table, segment) {
	const first = table.readUInt16BE(segment.start);
	const delta = table.readUInt16BE(segment.delta);
	const range = table.readUInt16BE(segment.range);
	const count = table.readUInt16BE(segment.end) - first + 1;
	return Array.from({ length: count }, (_, at) => first + at).filter((letter) => {
		const stored = range && table.readUInt16BE(segment.range + range + 2 * (letter - first));
		return letter < 0xffff && (range === 0 || stored !== 0) && ((stored || letter) + delta) % 0x10000 !== 0;
	});
}
