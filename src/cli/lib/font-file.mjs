/**
 * An uncompressed font file as a list of tables, after the OpenType specification ("The OpenType Font File" and its
 * chapter name). Numbers are big-endian.
 */

/** @typedef {Record<string, Buffer>} Tables by their four letters */

const HEADER = 12;
const RECORD = 16;

/**
 * @param {Buffer} file
 * @returns {Tables}
 */
export function tablesOf(file) {
	const count = file.readUInt16BE(4);
	return Object.fromEntries(
		Array.from({ length: count }, (_, at) => {
			const record = HEADER + at * RECORD;
			const start = file.readUInt32BE(record + 8);
			return [
				file.toString('latin1', record, record + 4),
				file.subarray(start, start + file.readUInt32BE(record + 12))
			];
		})
	);
}

/**
 * The file that holds these tables, with its sums of control.
 * @param {Tables} tables
 * @returns {Buffer}
 */
export function fileOf(tables) {
	const tags = Object.keys(tables).sort();
	const power = 2 ** Math.floor(Math.log2(tags.length));
	const head = Buffer.alloc(HEADER + RECORD * tags.length);
	head.writeUInt32BE(0x00010000, 0);
	head.writeUInt16BE(tags.length, 4);
	head.writeUInt16BE(power * RECORD, 6);
	head.writeUInt16BE(Math.log2(power), 8);
	head.writeUInt16BE((tags.length - power) * RECORD, 10);
	const parts = [head];
	let offset = head.length;
	for (const [at, tag] of tags.entries()) {
		const table = withoutSum(tag, tables[tag] ?? Buffer.alloc(0));
		const padded = Buffer.concat([table, Buffer.alloc((4 - (table.length % 4)) % 4)]);
		const record = HEADER + at * RECORD;
		head.write(tag, record, 'latin1');
		head.writeUInt32BE(sumOf(padded), record + 4);
		head.writeUInt32BE(offset, record + 8);
		head.writeUInt32BE(table.length, record + 12);
		parts.push(padded);
		offset += padded.length;
	}
	const file = Buffer.concat(parts);
	const at = HEADER + tags.indexOf('head') * RECORD;
	file.writeUInt32BE((0xb1b0afba - sumOf(file)) >>> 0, file.readUInt32BE(at + 8) + 8);
	return file;
}

/**
 * The table `head` holds the sum of the whole file, which is reckoned with 0 in its place.
 * @param {string} tag
 * @param {Buffer} table
 */
function withoutSum(tag, table) {
	const copy = Buffer.from(table);
	return tag === 'head' ? (copy.writeUInt32BE(0, 8), copy) : copy;
}

/** @param {Buffer} data as long as a multiple of 4 */
function sumOf(data) {
	let sum = 0;
	for (let at = 0; at < data.length; at += 4) {
		sum = (sum + data.readUInt32BE(at)) >>> 0;
	}
	return sum;
}

/**
 * The table `name` with these English words for Windows, which browsers read on every system.
 * @param {Record<number, string>} names by their number in the specification
 * @returns {Buffer}
 */
export function nameTable(names) {
	const entries = Object.entries(names).map(
		([id, words]) => /** @type {const} */ ([Number(id), Buffer.from(words, 'utf16le').swap16()])
	);
	const head = Buffer.alloc(6 + 12 * entries.length);
	head.writeUInt16BE(entries.length, 2);
	head.writeUInt16BE(head.length, 4);
	let offset = 0;
	for (const [at, [id, words]] of entries.entries()) {
		[3, 1, 0x409, id, words.length, offset].forEach((value, field) =>
			head.writeUInt16BE(value, 6 + 12 * at + 2 * field)
		);
		offset += words.length;
	}
	return Buffer.concat([head, ...entries.map(([, words]) => words)]);
}

/**
 * The words of the table `name` for Windows, by their number.
 * @param {Tables} tables
 * @returns {Record<number, string>}
 */
export function namesOf(tables) {
	const table = tables.name ?? Buffer.alloc(6);
	const stored = table.readUInt16BE(4);
	const records = Array.from({ length: table.readUInt16BE(2) }, (_, at) => 6 + 12 * at);
	return Object.fromEntries(
		records
			.filter((record) => table.readUInt16BE(record) === 3)
			.map((record) => {
				const start = stored + table.readUInt16BE(record + 10);
				const words = Buffer.from(table.subarray(start, start + table.readUInt16BE(record + 8)));
				return [table.readUInt16BE(record + 6), words.swap16().toString('utf16le')];
			})
	);
}
