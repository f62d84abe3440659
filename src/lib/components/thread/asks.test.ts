import { describe, expect, it } from 'vitest';
import type { EntryLine } from '$lib/domain/referrals/views';
import { asksOf } from './asks';

let seq = 0;
function entry(kind: EntryLine['kind'], ref: EntryLine['ref'] = null): EntryLine {
	seq += 1;
	return {
		id: `e${seq}`,
		seq,
		at: '2026-03-03T09:00:00.000Z',
		author: { id: 'p1', name: 'I. Aldous', role: 'therapist' },
		strand: 'therapy',
		kind,
		body: 'words',
		ref,
		asked: []
	};
}
const arm = { kind: 'clearance', id: 'c1' } as const;
const stairs = { kind: 'clearance', id: 'c2' } as const;
const referral = { kind: 'referral', id: 'r1' } as const;
const call = { kind: 'escalation', id: 'x1' } as const;
const unknown = () => null;

describe('asksOf', () => {
	it('ties an ask to the first later answer about the same thing', () => {
		const entries = [
			entry('ask', arm),
			entry('note'),
			entry('answer', stairs),
			entry('answer', arm),
			entry('answer', arm)
		];
		expect(asksOf(entries, unknown)).toEqual([{ entry: entries[0], answer: entries[3], open: null }]);
	});

	it('lets an ask without an answer hang loose', () => {
		const entries = [entry('ask', referral), entry('note'), entry('ask', arm)];
		expect(asksOf(entries, unknown).map(({ open }) => open)).toEqual([referral, arm]);
	});

	it('takes an event about it for its end: a referral that was withdrawn owes nothing', () => {
		const entries = [entry('ask', referral), entry('event', referral)];
		expect(asksOf(entries, unknown)).toMatchObject([{ answer: entries[1], open: null }]);
	});

	it('does not take an answer before the ask: asked again is open again', () => {
		const entries = [entry('ask', call), entry('answer', call), entry('ask', call)];
		expect(asksOf(entries, unknown).map(({ open }) => open)).toEqual([null, call]);
	});

	it('answers both halves of an escalation that took new facts in before it was taken', () => {
		const entries = [entry('ask', call), entry('ask', call), entry('answer', call)];
		expect(asksOf(entries, unknown).map(({ answer }) => answer?.id)).toEqual([
			entries[2]?.id,
			entries[2]?.id
		]);
	});

	it.each([
		[true, arm],
		[null, arm],
		[false, null]
	])('believes the row of the thing: still waits %s', (waits, open) => {
		expect(asksOf([entry('ask', arm)], () => waits)).toMatchObject([{ answer: null, open }]);
	});

	it('finds no ask in talk, in sessions, nor in asks about nothing that can wait', () => {
		const entries = [
			entry('note'),
			entry('session', { kind: 'session', id: 's1' }),
			entry('ask'),
			entry('ask', { kind: 'visit', id: 'v1' })
		];
		expect(asksOf(entries, unknown)).toEqual([]);
	});
});
