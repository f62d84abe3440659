import { describe, expect, it } from 'vitest';
import { nextSort, type Sort } from './table-sort';

describe('nextSort', () => {
	it.each<[Sort | null, string, Sort]>([
		[null, 'bed', { by: 'bed', direction: 'ascending' }],
		[{ by: 'bed', direction: 'ascending' }, 'bed', { by: 'bed', direction: 'descending' }],
		[{ by: 'bed', direction: 'descending' }, 'bed', { by: 'bed', direction: 'ascending' }],
		[{ by: 'bed', direction: 'ascending' }, 'name', { by: 'name', direction: 'ascending' }]
	])('%j, then %s, gives %j', (sort, column, expected) => {
		expect(nextSort(sort, column)).toEqual(expected);
	});
});
