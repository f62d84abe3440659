import { describe, expect, it } from 'vitest';
import type { EntryLine } from '$lib/domain/referrals/views';
import { openFirst, opening, type ReadAsk } from './owed';

const ask = (id: string, open: boolean, mine: boolean): ReadAsk => ({
	entry: { id } as EntryLine,
	answer: null,
	open: open ? { kind: 'clearance', id } : null,
	waiting: null,
	mine
});

describe('openFirst', () => {
	it.each([
		['none', [], []],
		['an answered one alone', [ask('a', false, false)], []],
		[
			'what waits on the reader before what waits on others, each in its order',
			[ask('a', true, false), ask('b', true, true), ask('c', false, false), ask('d', true, true)],
			['b', 'd', 'a']
		]
	])('%s', (_, asks, expected) => {
		expect(openFirst(asks).map(({ entry }) => entry.id)).toEqual(expected);
	});
});

describe('opening', () => {
	it.each([
		['', ''],
		['0123456789', '0123456789'],
		['01234 6789 1', '01234 6789 …'],
		['01234 67890 1', '01234 …'],
		['0123456789012', '0123456789 …'],
		['one\ntwo', 'one']
	])('of %j: %j', (body, expected) => {
		expect(opening(body, 10)).toBe(expected);
	});
});
