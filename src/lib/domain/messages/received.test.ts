import { describe, expect, it } from 'vitest';
import { readableWords } from './received';

describe('words that came in', () => {
	it.each(['YES', 'Sí', 'no', 'STOP', 'Take 4829', 'take', 'TAKE 48 29', '1', 'ok'])(
		'%j is a command, and is shown',
		(body) => expect(readableWords(body)).toBe(body)
	);

	it.each([
		'yes but my wound is wet',
		'Take 4829, is it Mrs Abernathy again?',
		'TAKE 4829 ok coming',
		'My chest hurts',
		'',
		'22'
	])('%j is not shown', (body) => expect(readableWords(body)).toBeNull());
});
