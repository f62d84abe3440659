import { describe, expect, it } from 'vitest';
import { fitting } from './combobox';

const options = [
	{ value: '1', label: 'Marta Lisowska', hint: 'T4, Łódź' },
	{ value: '2', label: 'Tobias Rennick', hint: 'T5' },
	{ value: '3', label: 'Ada O’Leary-Strøm', hint: 'H2' }
];

describe('fitting', () => {
	it.each([
		{ typed: '', found: ['1', '2', '3'] },
		{ typed: 'lis mar', found: ['1'] },
		{ typed: 'LODZ', found: ['1'] },
		{ typed: 't', found: ['1', '2'] },
		{ typed: 't5', found: ['2'] },
		{ typed: 'strom', found: ['3'] },
		{ typed: 'sowska', found: [] },
		{ typed: 'marta rennick', found: [] }
	])('"$typed" finds $found', ({ typed, found }) => {
		expect(fitting(options, typed).map(({ value }) => value)).toEqual(found);
	});
});
