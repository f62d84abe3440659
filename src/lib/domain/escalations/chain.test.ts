import { describe, expect, it } from 'vitest';
import { chainOf, chainPosts, chainStep, dueSteps, isChainSpent } from './chain';

// Times of the default chains: common practice, no published source.
describe('the chain of a high escalation', () => {
	it('is announced post by post', () => {
		expect(chainOf('high')).toEqual([
			{ step: 0, afterSeconds: 0, post: 'nurse' },
			{ step: 0, afterSeconds: 0, post: 'nurse-in-charge' },
			{ step: 1, afterSeconds: 120, post: 'nurse' },
			{ step: 1, afterSeconds: 120, post: 'nurse-in-charge' },
			{ step: 2, afterSeconds: 180, post: 'physician' },
			{ step: 3, afterSeconds: 480, post: 'surgeon' }
		]);
	});

	it('repeats every five minutes at its end, and tells everybody', () => {
		expect(chainStep('high', 4)).toEqual({
			afterSeconds: 780,
			posts: ['nurse', 'nurse-in-charge', 'physician', 'surgeon']
		});
		expect(chainStep('high', 5).afterSeconds).toBe(1080);
	});

	it.each([
		[3, false],
		[4, true]
	])('next step %i: spent is %s', (step, spent) => {
		expect(isChainSpent('high', step)).toBe(spent);
	});
});

describe('dueSteps', () => {
	const raised = 1_000_000;
	it.each([
		['just before the second step', 1, 119_999, [], 1, 120_000],
		['at the second step', 1, 120_000, [1], 2, 180_000],
		['just before the third', 2, 179_999, [], 2, 180_000],
		['both overdue after a stop', 1, 200_000, [1, 2], 3, 480_000],
		['the surgeon', 3, 480_000, [3], 4, 780_000],
		['the first repeat', 4, 780_000, [4], 5, 1_080_000],
		['an hour of stop tells the repeats once', 1, 3_600_000, [1, 2, 3, 13], 14, 3_780_000]
	])('%s', (_, next, after, due, nextStep, nextAfter) => {
		expect(dueSteps('high', raised, next, raised + after)).toEqual({
			due,
			nextStep,
			nextAt: raised + nextAfter
		});
	});

	it.each([
		['medium', 1, 600],
		['medium', 2, 1800],
		['low', 1, 3600],
		['low', 2, 14400]
	] as const)('%s step %i is due after %i s', (grade, step, seconds) => {
		expect(chainStep(grade, step).afterSeconds).toBe(seconds);
	});
});

describe('the planned steps', () => {
	it.each([
		[-1, [false, false, false, false]],
		[1, [true, true, false, false]],
		[3, [true, true, true, true]],
		[9, [true, true, true, true]]
	])('after step %i', (lastTold, told) => {
		expect(chainPosts('high', lastTold).map((step) => step.told)).toEqual(told);
	});
});
