import { describe, expect, it } from 'vitest';
import { callWords } from './calls';

describe('callWords', () => {
	it.each([
		[{ state: 'raised' }, 'nobody has it yet'],
		[{ state: 'taken', takenBy: 'R. Ferris' }, 'R. Ferris has it'],
		[{ state: 'taken' }, 'somebody has it'],
		[{ state: 'taken', takenBy: 'R. Ferris', notThere: true }, 'taken, but nobody is there'],
		[{ state: 'settled', takenBy: 'R. Ferris' }, 'escalation settled'],
		[{ state: 'withdrawn' }, 'escalation withdrawn']
	] as const)('%j: %s', (call, words) => {
		expect(callWords(call)).toBe(words);
	});
});
