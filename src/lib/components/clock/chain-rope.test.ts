import { describe, expect, it } from 'vitest';
import { chainPosts } from '$lib/domain/escalations/chain';
import { GRADES } from '$lib/domain/core/codes';
import { laidShare, postsWords, stepTimeWords } from './chain-rope';

describe('laidShare', () => {
	// The chain of a high escalation: 0, 120, 180 and 480 seconds.
	it.each([
		[-1, 0],
		[0, 0],
		[60, 0.125],
		[120, 0.25],
		[150, 0.375],
		[180, 0.5],
		[330, 0.625],
		[479, 0.5 + (299 / 300) * 0.25],
		[480, 1],
		[9999, 1]
	])('after %i s is %d', (seconds, share) => {
		expect(laidShare(chainPosts('high', -1), seconds)).toBeCloseTo(share, 10);
	});

	it.each(GRADES)('never shrinks as time goes by (%s)', (grade) => {
		const steps = chainPosts(grade, -1);
		const shares = Array.from({ length: 400 }, (_, index) => laidShare(steps, index * 40));
		expect(shares).toEqual([...shares].sort((a, b) => a - b));
	});
});

describe('who is told, and when', () => {
	it.each([
		[['nurse'], 'nurse on cover'],
		[['nurse', 'nurse-in-charge'], 'nurses'],
		[['physician'], 'physician'],
		[['nurse', 'nurse-in-charge', 'physician', 'surgeon'], 'everybody']
	] as const)('%j are %s', (posts, words) => {
		expect(postsWords(posts)).toBe(words);
	});

	it.each([
		[0, 'at once'],
		[120, 'after 2 min'],
		[1800, 'after 30 min'],
		[3600, 'after 60 min'],
		[7200, 'after 2 h'],
		[14400, 'after 4 h']
	])('%i s is %s', (seconds, words) => {
		expect(stepTimeWords(seconds)).toBe(words);
	});
});
