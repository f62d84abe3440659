import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import fontverter from 'fontverter';
import subsetFont from 'subset-font';
import { lettersOf } from './font-cmap.mjs';
import { fileOf, nameTable, namesOf, tablesOf } from './font-file.mjs';
import { LETTERS } from './font-letters.mjs';

const require = createRequire(import.meta.url);

/**
 * The faces are cut from Lato, whose licence keeps that name for the unaltered files: what is cut bears ours.
 */
export const FAMILY = 'Ropewalk Sans';

/** @type {readonly { weight: number, style: string, source: string }[]} */
export const FACES = [
	{ weight: 400, style: 'Regular', source: 'lato-normal' },
	{ weight: 700, style: 'Bold', source: 'lato-bold' },
	{ weight: 900, style: 'Black', source: 'lato-black' }
];

/** Kerning, accents put together, and figures of one width and height; small capitals and the like are left out. */
const FEATURES = ['ccmp', 'kern', 'lnum', 'locl', 'mark', 'mkmk', 'tnum'];

/**
 * One face for the web: the letters of `LETTERS`, under our name.
 * @param {(typeof FACES)[number]} face
 * @returns {Promise<Buffer>} a file in the format woff2, the same bytes every time
 * @throws {Error} when the face has not every letter
 */
export async function cutFace({ style, source }) {
	const original = readFileSync(require.resolve(`lato-font/fonts/${source}/${source}.woff2`));
	const cut = await subsetFont(original, LETTERS, { targetFormat: 'sfnt', keepFeatures: FEATURES });
	const tables = tablesOf(cut);
	const has = lettersOf(tables);
	const missing = [...LETTERS].filter((letter) => !has.has(letter.codePointAt(0) ?? 0));
	if (missing.length > 0) {
		throw new Error(`${source} has no ${missing.join(' ')}`);
	}
	const names = namesOf(tablesOf(await fontverter.convert(original, 'sfnt')));
	tables.name = nameTable(ourNames(style, names));
	tables['OS/2'] = withOneHeight(tables);
	return fontverter.convert(fileOf(tables), 'woff2');
}

/**
 * The face gives two heights of a line, and browsers differ in which they read: the one of `hhea` sets words in the
 * middle of a button, and stands in both places here.
 * @param {import('./font-file.mjs').Tables} tables
 * @returns {Buffer} the table `OS/2`
 */
function withOneHeight({ 'OS/2': metrics = Buffer.alloc(0), hhea = Buffer.alloc(0) }) {
	return Buffer.concat([metrics.subarray(0, 68), hhea.subarray(4, 10), metrics.subarray(74)]);
}

/**
 * What the face calls itself, with the notices of those who drew it. The numbers are those of the specification.
 * @param {string} style
 * @param {Record<number, string>} theirs
 * @returns {Record<number, string>}
 */
function ourNames(style, theirs) {
	const black = style === 'Black';
	/** @type {Record<number, string>} */
	const beyondBold = black ? { 16: FAMILY, 17: style } : {};
	return {
		...beyondBold,
		0: theirs[0] ?? '',
		1: black ? `${FAMILY} ${style}` : FAMILY,
		2: black ? 'Regular' : style,
		3: `Ropewalk;${FAMILY};${style}`,
		4: `${FAMILY} ${style}`,
		5: theirs[5] ?? '',
		6: `${FAMILY.replace(' ', '')}-${style}`,
		7: theirs[7] ?? '',
		8: theirs[8] ?? '',
		9: theirs[9] ?? '',
		10: 'A part of the letters of another face, renamed as its licence asks. Copyright and trademark name it.',
		13: theirs[13] ?? '',
		14: theirs[14] ?? ''
	};
}
