import { describe, expect, it } from 'vitest';
import { tabAfter } from './tab-keys';

describe('the keys of three tabs', () => {
	it.each([
		['ArrowRight', 0, 1],
		['ArrowRight', 2, 0],
		['ArrowLeft', 1, 0],
		['ArrowLeft', 0, 2],
		['Home', 2, 0],
		['End', 0, 2],
		['ArrowDown', 0, null],
		['a', 1, null]
	])('%s on tab %d leads to %s', (key, at, next) => {
		expect(tabAfter(key, at, 3)).toBe(next);
	});
});
