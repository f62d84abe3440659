import { describe, expect, it } from 'vitest';
import { readDate, readTime } from './typed-date';

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

describe('readTime', () => {
	it.each([
		['09:30', '09:30'],
		['9:30', '09:30'],
		['9.30', '09:30'],
		[' 9 30 ', '09:30'],
		['9h30', '09:30'],
		['930', '09:30'],
		['0930', '09:30'],
		['9', '09:00'],
		['23:59', '23:59'],
		['24:00', null],
		['9:60', null],
		['9:3', null],
		['12345', null],
		['noon', null],
		['', null]
	])('%j is %j', (typed, time) => {
		expect(readTime(typed)).toBe(time);
	});
});
