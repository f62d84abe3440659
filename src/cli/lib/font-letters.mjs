/**
 * The letters that the shipped faces have: what the Latin alphabets of Europe write names with, the punctuation and
 * the signs of our own words. Vietnamese and what only linguists write are left out, because every letter is paid for
 * by each first visit.
 */

/** @type {readonly (readonly [first: number, last: number, what: string])[]} */
const RANGES = [
	[0x20, 0x7e, 'plain letters, figures and signs'],
	[0xa0, 0xff, 'western and northern Europe'],
	[0x100, 0x17f, 'central Europe, the Baltic, Turkey, Malta, Wales, the Sami'],
	[0x18f, 0x18f, 'Azeri'],
	[0x1c4, 0x1cc, 'Croatian pairs'],
	[0x1e4, 0x1ef, 'Skolt Sami'],
	[0x1f1, 0x1f3, 'Croatian pairs'],
	[0x1fa, 0x1ff, 'Danish with accents'],
	[0x200, 0x217, 'Slovene and Croatian tones'],
	[0x218, 0x21b, 'Romanian, with the comma below'],
	[0x21e, 0x21f, 'Romani'],
	[0x226, 0x233, 'Livonian'],
	[0x237, 0x237, 'a letter that accents are put on'],
	[0x259, 0x259, 'Azeri'],
	[0x292, 0x292, 'Skolt Sami'],
	[0x2b9, 0x2bc, 'marks within a name'],
	[0x2c6, 0x2c7, 'accents by themselves'],
	[0x2d8, 0x2dd, 'accents by themselves'],
	[0x300, 0x304, 'accents put on a letter'],
	[0x306, 0x30c, 'accents put on a letter'],
	[0x30f, 0x30f, 'accents put on a letter'],
	[0x311, 0x311, 'accents put on a letter'],
	[0x323, 0x323, 'accents put on a letter'],
	[0x326, 0x328, 'accents put on a letter'],
	[0x1e02, 0x1e03, 'Irish with dots'],
	[0x1e0a, 0x1e0b, 'Irish with dots'],
	[0x1e1e, 0x1e1f, 'Irish with dots'],
	[0x1e40, 0x1e41, 'Irish with dots'],
	[0x1e56, 0x1e57, 'Irish with dots'],
	[0x1e60, 0x1e61, 'Irish with dots'],
	[0x1e6a, 0x1e6b, 'Irish with dots'],
	[0x1e80, 0x1e85, 'Welsh'],
	[0x1e9e, 0x1e9e, 'German capitals'],
	[0x1ef2, 0x1ef3, 'Welsh']
];

const SIGNS = '‐‒–—―‘’‚“”„†‡•…‰′″‹›⁄₂€№™←↑→↓−×≈≠≤≥∞Δμ';

/** Every letter of a shipped face, as one text. */
export const LETTERS =
	RANGES.map(([first, last]) =>
		Array.from({ length: last - first + 1 }, (_, at) => String.fromCodePoint(first + at)).join('')
	).join('') + SIGNS;
