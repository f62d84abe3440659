import { describe, expect, it } from 'vitest';
import { calculateSmsBody, phoneField, settleTextBody } from './forms';

describe('calculateSmsBody', () => {
	it.each([[''], ['  a '], ['x'.repeat(10_000)]])('keeps the text as it is', (text) => {
		expect(calculateSmsBody.parse({ text })).toEqual({ text });
	});

	it.each([
		[{}, 'text is missing or no text.'],
		[{ text: 5 }, 'text is missing or no text.'],
		[{ text: 'x'.repeat(10_001) }, 'text has 10001 characters, and the limit is 10000.']
	])('refuses %j', (body, message) => {
		expect(calculateSmsBody.safeParse(body).error?.issues[0]).toMatchObject({ path: ['text'], message });
	});
});

describe('phoneField', () => {
	it('gives the E.164 form', () => {
		expect(phoneField().parse('086 123 4567')).toBe('+353861234567');
		expect(phoneField('phone', '+44').parse('020 7946 0958')).toBe('+442079460958');
	});

	it.each([
		['nobody', "phone: 'nobody' is not a telephone number: write digits"],
		['861234567', "phone: '861234567' is not a telephone number: begin with +"],
		[undefined, 'phone is missing or no text.'],
		['0'.repeat(41), 'phone has 41 characters, and the limit is 40.']
	])('refuses %j', (value, message) => {
		expect(phoneField().safeParse(value).error?.issues[0]?.message).toContain(message);
	});
});

describe('settleTextBody', () => {
	it.each([
		['', 'note is empty.'],
		['   ', 'note is empty.'],
		['x'.repeat(501), 'note has 501 characters, and the limit is 500.'],
		[undefined, 'note is missing or no text.']
	])('refuses %j', (note, message) => {
		const { error } = settleTextBody.safeParse({ note });
		expect(error?.issues.map((issue) => issue.message)).toEqual([message]);
	});

	it.each([['Called.'], ['x'.repeat(500)]])('takes %j', (note) => {
		expect(settleTextBody.parse({ note: ` ${note} ` })).toEqual({ note });
	});
});
