import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isRfc3339, parseRfc3339, toRfc3339 } from './instant';
import { TimeError } from './time';

describe('parseRfc3339', () => {
	it.each([
		['2025-03-28T10:00:00Z', '2025-03-28T10:00:00.000Z'],
		['2025-03-28T10:00:00.5Z', '2025-03-28T10:00:00.500Z'],
		['2025-03-28T10:00:00.123999Z', '2025-03-28T10:00:00.123Z'],
		['2025-03-28T11:00:00+01:00', '2025-03-28T10:00:00.000Z'],
		['2025-03-28T04:30:00-05:30', '2025-03-28T10:00:00.000Z'],
		['2025-01-01T00:30:00+01:00', '2024-12-31T23:30:00.000Z'],
		['2025-03-28T10:00:00-00:00', '2025-03-28T10:00:00.000Z'],
		['2025-03-28t10:00:00z', '2025-03-28T10:00:00.000Z'],
		['2024-02-29T23:59:59Z', '2024-02-29T23:59:59.000Z']
	])('%s', (text, expected) => {
		expect(toRfc3339(parseRfc3339(text))).toBe(expected);
		expect(isRfc3339(text)).toBe(true);
	});

	it.each([
		['2025-02-29T10:00:00Z', 'there is no day 2025-02-29'],
		['2025-04-31T10:00:00Z', 'there is no day 2025-04-31'],
		['2025-13-01T10:00:00Z', 'there is no day 2025-13-01'],
		['2025-03-28T24:00:00Z', 'there is no time 24:00:00'],
		['2025-03-28T10:60:00Z', 'there is no time 10:60:00'],
		['2025-06-30T23:59:60Z', 'there is no time 23:59:60'],
		['2025-03-28T10:00:00+24:00', 'its offset 24:00 is over 23:59'],
		['2025-03-28T10:00:00+01:60', 'its offset 01:60 is over 23:59'],
		['2025-03-28T10:00:00', 'with Z or an offset'],
		['2025-03-28T10:00Z', 'write it like'],
		['2025-03-28 10:00:00Z', 'write it like'],
		['2025-03-28', 'write it like'],
		['2025-03-28T10:00:00.Z', 'write it like'],
		['2025-03-28T10:00:00+0100', 'write it like'],
		[' 2025-03-28T10:00:00Z', 'write it like'],
		['1743156000000', 'write it like'],
		['', 'write it like']
	])('refuses %j', (text, reason) => {
		expect(() => parseRfc3339(text)).toThrow(TimeError);
		expect(() => parseRfc3339(text)).toThrow(`'${text}' is not an instant`);
		expect(() => parseRfc3339(text)).toThrow(reason);
		expect(isRfc3339(text)).toBe(false);
	});
});

describe('toRfc3339', () => {
	it('is read back to the same millisecond', () => {
		const instants = fc.integer({
			min: Date.parse('0001-01-01'),
			max: Date.parse('9999-12-31T23:59:59.999Z')
		});
		fc.assert(
			fc.property(instants, (at) => {
				expect(parseRfc3339(toRfc3339(at))).toBe(at);
			})
		);
	});

	it.each([0.5, NaN, Date.parse('0001-01-01') - 1, Date.parse('9999-12-31T23:59:59.999Z') + 1])(
		'refuses %s',
		(at) => {
			expect(() => toRfc3339(at)).toThrow('whole milliseconds UTC');
		}
	);
});
