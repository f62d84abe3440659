import { describe, expect, it } from 'vitest';
import { targetOf } from './row-keys';

describe('targetOf', () => {
	it.each([
		['ArrowDown', 0, 1],
		['ArrowDown', 2, null],
		['ArrowUp', 2, 1],
		['ArrowUp', 0, null],
		['Home', 2, 0],
		['End', 0, 2],
		['Tab', 1, null],
		['j', 1, null]
	])('%s in row %d of three leads to %s', (key, at, target) => {
		expect(targetOf(key, at, 3)).toBe(target);
	});
});
