import { describe, expect, it } from 'vitest';
import { elapsed } from './elapsed';

const SECOND = 1000;
const MINUTE = 60 * SECOND;
const HOUR = 60 * MINUTE;

describe('elapsed', () => {
	it.each([
		[-5 * SECOND, '0:00'],
		[0, '0:00'],
		[46 * SECOND, '0:46'],
		[MINUTE - 1, '0:59'],
		[MINUTE, '1:00'],
		[MINUTE + 46 * SECOND, '1:46'],
		[HOUR - 1, '59:59'],
		[HOUR, '1:00:00'],
		[HOUR + 2 * MINUTE + 7 * SECOND, '1:02:07'],
		[48 * HOUR - 1, '47:59:59'],
		[48 * HOUR, '2 days']
	])('reads %i ms as %s', (milliseconds, words) => {
		expect(elapsed(milliseconds)).toBe(words);
	});
});
