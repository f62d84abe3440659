import { describe, expect, it } from 'vitest';
import { readDate } from './typed-date';

describe('readDate', () => {
	it.each([
		['1958-09-05', '1958-09-05'],
		['5 9 1958', '1958-09-05'],
		['05/09/1958', '1958-09-05'],
		[' 5.9.1958 ', '1958-09-05'],
		['5-9-1958', '1958-09-05'],
		// The day comes first, whatever the browser's country: 5 September, not 9 May.
		['05.09.1958', '1958-09-05'],
		['29 2 2024', '2024-02-29'],
		['29 2 2026', null],
		['31 4 2026', null],
		['13 13 2026', null],
		['0 1 2026', null],
		['5 9 58', null],
		['5 September 1958', null],
		['', null]
	])('%j is %j', (typed, date) => {
		expect(readDate(typed)).toBe(date);
	});
});
