import { describe, expect, it } from 'vitest';
import { hurried } from './needed-by';

describe('hurried', () => {
	it.each([
		['nobody said when', null, 500],
		['after the plan', 501, 500],
		['with the plan', 500, 500],
		['before the plan', 499, 499],
		['one ms from now', 101, 101],
		['now', 100, 500],
		['past', 99, 500]
	])('needed by: %s', (_, neededBy, due) => {
		expect(hurried(500, neededBy, 100)).toBe(due);
	});
});
