import { describe, expect, it } from 'vitest';
import { LINE_KINDS } from '../domain/lines/codes';
import { LINE_WORDS, linesWords, oxygenFact, oxygenWords } from './lines';

describe('the words for lines and oxygen', () => {
	it('name what is in, in its order, and say nothing of nothing', () => {
		expect(linesWords(['chest-drain', 'pacing-wires'])).toBe('chest drain, pacing wires');
		expect(linesWords([])).toBe('');
	});

	it('name each kind differently', () => {
		expect(new Set(LINE_KINDS.map((kind) => LINE_WORDS[kind]())).size).toBe(LINE_KINDS.length);
	});

	it.each([
		[{ lpm: 2 }, 'oxygen 2 L/min', '2 L/min'],
		[{ lpm: 0.5 }, 'oxygen 0.5 L/min', '0.5 L/min'],
		[{ lpm: 0 }, 'no oxygen', 'none'],
		[null, 'oxygen: not known', 'not known']
	])('of %j are “%s”, beside the term “%s”', (oxygen, words, fact) => {
		expect(oxygenWords(oxygen)).toBe(words);
		expect(oxygenFact(oxygen)).toBe(fact);
	});
});
