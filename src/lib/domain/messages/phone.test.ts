import { describe, expect, it } from 'vitest';
import { PhoneError, isE164, normalisePhone } from './phone';

describe('normalisePhone', () => {
	it.each([
		['+353861234567', '+353861234567'],
		['+353 86 123 4567', '+353861234567'],
		['+353 (0)86 123 4567', '+353861234567'],
		['00353 86 123 4567', '+353861234567'],
		['086 123 4567', '+353861234567'],
		['086-123.4567', '+353861234567'],
		['(086) 123 4567', '+353861234567'],
		['086/1234567', '+353861234567'],
		[' 0861234567\n', '+353861234567'],
		['０８６ 123 4567', '+353861234567'],
		['086 123–4567', '+353861234567'],
		['+1 202 555 0143', '+12025550143'],
		['+44 20 7946 0958', '+442079460958'],
		['+12345678', '+12345678'],
		['+123456789012345', '+123456789012345']
	])('%j is %s', (value, expected) => {
		expect(normalisePhone(value)).toBe(expected);
		expect(normalisePhone(expected)).toBe(expected);
	});

	it('puts a national number into the country it is given', () => {
		expect(normalisePhone('020 7946 0958', '+44')).toBe('+442079460958');
	});

	it.each([
		['', 'write digits'],
		['unknown', 'write digits'],
		['086 123 4567 ext 2', 'write digits'],
		['086 123 4567, 087 123 4567', 'write digits'],
		['+353 86 + 123', 'write digits'],
		["086'; DROP", 'write digits'],
		['ok\r\n+353861234567', 'write digits'],
		['861234567', 'begin with + and the country code, or with 0 for a number in +353'],
		['+1234567', 'it has 7 digits with the country code; 8 to 15 are needed'],
		['+1234567890123456', 'it has 16 digits with the country code; 8 to 15 are needed'],
		['+0861234567', '8 to 15 are needed'],
		['0', 'it has 3 digits']
	])('refuses %j', (value, wanted) => {
		expect(() => normalisePhone(value)).toThrow(PhoneError);
		expect(() => normalisePhone(value)).toThrow(`'${value}' is not a telephone number`);
		expect(() => normalisePhone(value)).toThrow(wanted);
	});
});

describe('isE164', () => {
	it.each([
		['+353861234567', true],
		['353861234567', false],
		['+353 861234567', false],
		['+0353861234567', false],
		['+1234567', false],
		['+1234567890123456', false]
	])('%s: %s', (value, expected) => {
		expect(isE164(value)).toBe(expected);
	});
});
