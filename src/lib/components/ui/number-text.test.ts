import { describe, expect, it } from 'vitest';
import { readNumber } from './number-text';

describe('readNumber', () => {
	it.each(['', ' ', '\t'])('takes %j as nothing typed', (text) => {
		expect(readNumber(text)).toEqual({ kind: 'empty' });
	});

	it.each([
		['128', 128],
		[' 128 ', 128],
		['36.9', 36.9],
		['36,9', 36.9],
		['.5', 0.5],
		['5.', 5],
		['-2', -2],
		['+2', 2],
		['0', 0],
		['007', 7]
	])('reads %j as %d', (text, value) => {
		expect(readNumber(text)).toEqual({ kind: 'number', value });
	});

	it.each(['12o', '1 2', '1,2,3', '12/8', '-', '.', ',', '1e3', '0x10', 'Infinity', '١٢'])(
		'calls %j unreadable, never empty and never a number',
		(text) => {
			expect(readNumber(text)).toEqual({ kind: 'unreadable' });
		}
	);
});
