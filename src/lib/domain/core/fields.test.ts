import { describe, expect, it } from 'vitest';
import { text } from './fields';

const question = text('The question', 5);
const said = (value: unknown) => question.safeParse(value).error?.issues.map(({ message }) => message) ?? [];

describe('text', () => {
	it.each<[unknown, string[]]>([
		['abcd', []],
		['abcde', []],
		[' abcde ', []],
		['a\tb\nc', []],
		['abcdef', ['The question has 6 characters, and the limit is 5.']],
		['', ['The question is empty.']],
		[' \n', ['The question is empty.']],
		[undefined, ['The question is missing or no text.']],
		[7, ['The question is missing or no text.']],
		['a\u0000b', ['The question contains a control character.']],
		['\ud800', ['The question contains a control character.']]
	])('%j: %j', (value, messages) => {
		expect(said(value)).toEqual(messages);
	});
});
