import { describe, expect, it } from 'vitest';
import { typedNumber } from './fields';
import { numberOf, readNumber } from './typed-number';

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

describe('numberOf', () => {
	it.each([
		['', null],
		['  ', null],
		['12,5', 12.5],
		['0', 0]
	])('%j is %s', (text, value) => {
		expect(numberOf(text)).toBe(value);
	});

	it.each(['1e', '12o'])('never takes %j for none', (text) => {
		expect(() => numberOf(text)).toThrow('not checked');
	});
});

describe('a number that a form posts', () => {
	const said = (schema: ReturnType<typeof typedNumber>, typed: unknown) => {
		const { data, error } = schema.safeParse(typed);
		return error ? error.issues.map(({ message }) => message) : data;
	};
	const pulse = typedNumber('Pulse', { low: 20, high: 250, unit: 'beats/min' });
	const wanted = 'write a number from 20 to 250 beats/min.';

	it.each([
		['', ''],
		['20', '20'],
		[' 20,5 ', ' 20,5 '],
		['250', '250'],
		['250.1', [`Pulse: 250.1 cannot be taken; ${wanted}`]],
		['19', [`Pulse: 19 cannot be taken; ${wanted}`]],
		['1e', [`Pulse: “1e” is no number; ${wanted}`]],
		['9'.repeat(41), ['Pulse has 41 characters, and the limit is 40.']],
		[undefined, ['Pulse is missing or no text.']],
		[80, ['Pulse is missing or no text.']]
	])('%j: %j, and stays as it was typed', (typed, answer) => {
		expect(said(pulse, typed)).toEqual(answer);
	});

	it('may be needed, whole, or without bounds', () => {
		const minutes = typedNumber('Minutes', { low: 1, high: 240, whole: true, needed: true });
		const whole = 'write a whole number from 1 to 240.';
		expect(said(minutes, ' ')).toEqual([`Minutes is empty: ${whole}`]);
		expect(said(minutes, '12,5')).toEqual([`Minutes: 12.5 cannot be taken; ${whole}`]);
		expect(said(minutes, '12')).toBe('12');
		expect(said(typedNumber('New value'), '1e')).toEqual([
			'New value: “1e” is no number; write one such as 12 or 12.5.'
		]);
		expect(said(typedNumber('New value'), '-4000')).toBe('-4000');
	});
});
