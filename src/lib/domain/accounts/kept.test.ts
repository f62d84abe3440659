import { describe, expect, it } from 'vitest';
import { keptForm, wordsOf } from './kept';

function posted(fields: [string, string | Blob][]): FormData {
	const data = new FormData();
	for (const [name, value] of fields) {
		data.append(name, value);
	}
	return data;
}

describe('a kept form', () => {
	it('has every field in its order, a repeated one each time, and no secret and no file', () => {
		const form = posted([
			['units', 'u1'],
			['units', 'u2'],
			['current', 'hush'],
			['body', 'Drain out\nat 14:10'],
			['file', new Blob(['x'])]
		]);
		expect(keptForm('/account?/change', form, ['current'])).toEqual({
			to: '/account?/change',
			fields: [
				['units', 'u1'],
				['units', 'u2'],
				['body', 'Drain out\nat 14:10']
			]
		});
	});

	it.each([
		['words', 'She slept well.', ['She slept well.']],
		['words with space around them', '  She slept well. ', ['She slept well.']],
		['a code', 'physiotherapy', []],
		['an identifier', '01890000-0000-7000-8000-000000000000', []],
		['nothing', '   ', []]
	])('shows %s or does not', (_, value, shown) => {
		expect(wordsOf({ to: '/', fields: [['field', value]] })).toEqual(shown);
	});
});
