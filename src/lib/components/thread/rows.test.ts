import { describe, expect, it } from 'vitest';
import type { EntryLine } from '$lib/domain/referrals/views';
import { asksOf } from './asks';
import { newsOf, rowsOf, waysOf } from './rows';

function entry(seq: number, authorId: string | null, kind: EntryLine['kind'] = 'note'): EntryLine {
	return {
		id: `e${seq}`,
		seq,
		at: '2026-03-03T09:00:00.000Z',
		author: authorId === null ? null : { id: authorId, name: authorId, role: 'therapist' },
		strand: 'therapy',
		kind,
		body: 'words',
		ref: kind === 'note' ? null : { kind: 'clearance', id: 'c1' },
		asked: []
	};
}

const talk = [entry(1, 'other'), entry(2, 'other'), entry(3, 'me'), entry(4, 'other'), entry(5, null)];

describe('newsOf', () => {
	it.each([
		[1, [2, 4, 5]],
		[2, [4, 5]],
		[4, [5]],
		[5, []]
	])('since entry %d are %j, and never one’s own words', (openedAt, news) => {
		expect(newsOf(talk, openedAt, 'me').map(({ seq }) => seq)).toEqual(news);
	});
});

describe('rowsOf', () => {
	it('marks what is new', () => {
		const rows = rowsOf(talk, [], newsOf(talk, 2, 'me'));
		expect(rows.map(({ isNew }) => isNew)).toEqual([false, false, false, true, true]);
	});

	it('gives each ask its row', () => {
		const entries = [entry(1, 'other', 'ask'), entry(2, 'other')];
		const asks = asksOf(entries, () => null);
		expect(rowsOf(entries, asks, []).map(({ ask }) => ask)).toEqual([asks[0], null]);
	});
});

describe('waysOf', () => {
	const asked = entry(1, 'other', 'ask');
	const answered = entry(2, 'other', 'answer');
	it.each([
		['answered', [asked, answered], null, [{ from: 'e1', to: 'e2', strand: 'therapy' }]],
		['open', [asked], null, [{ from: 'e1', to: null, strand: 'therapy' }]],
		['ended without a word', [asked], false, []]
	])('draws an ask that is %s', (_, entries, waits, ways) => {
		expect(waysOf(asksOf(entries, () => waits))).toEqual(ways);
	});
});
