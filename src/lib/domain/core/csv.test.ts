import { expect, it } from 'vitest';
import { csvOf } from './csv';

it.each<[string, string | number | null, string]>([
	['a word', 'Tern Ward', 'Tern Ward'],
	['nothing', null, ''],
	['a number below nought', -3, '-3'],
	['a comma', 'a, b', '"a, b"'],
	['a quote', 'a "b"', '"a ""b"""'],
	['a line break', 'a\nb', '"a\nb"'],
	['a formula', '=1+1', "'=1+1"],
	['a number to call', '+353', "'+353"],
	['a formula with a quote', '=HYPERLINK("x")', '"\'=HYPERLINK(""x"")"']
])('%s', (_, value, cell) => {
	expect(csvOf([['first', value]])).toBe(`first,${cell}\r\n`);
});

it('nothing is an empty table', () => {
	expect(csvOf([])).toBe('');
});
