import { describe, expect, it } from 'vitest';
import type { LevelView } from '$lib/domain/levels/views';
import { heldBack } from './held-back';

type Given = NonNullable<LevelView['advice']>;
const advice = (against: number, needs: Given['needs'] = []): Given => ({
	suggestion: 'stay',
	to: 4,
	reasons: [
		{ weight: 'for', words: 'The pulse answered as it should.' },
		...Array.from({ length: against }, () => ({ weight: 'against' as const, words: 'A caution.' }))
	],
	needs,
	sessionId: 's',
	sessionAt: '2026-03-03T09:00:00Z',
	sessionLevel: 4
});

describe('heldBack', () => {
	it('hangs nothing where no session speaks, or nothing holds back', () => {
		expect(heldBack(null)).toEqual([]);
		expect(heldBack(advice(0))).toEqual([]);
	});

	it('hangs what the therapist weighs, and what others have not cleared', () => {
		expect(heldBack(advice(2, ['stairs']))).toEqual([
			{ strand: 'medical', words: 'not cleared: stairs' },
			{ strand: 'therapy', words: 'reasons that hold back: 2' }
		]);
	});
});
