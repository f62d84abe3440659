import { describe, expect, it } from 'vitest';
import { LEVELS } from '../core/codes';
import { LEVEL_BANDS, levelForMets } from './levels';

describe('levelForMets', () => {
	// Bands from memory (textbook step programmes); edges are ours: the lower end belongs to the band, and 5 to the last.
	it.each([
		[0.9, 'below-table'],
		[0.999, 'below-table'],
		[1, 1],
		[1.499, 1],
		[1.5, 2],
		[1.999, 2],
		[2, 3],
		[2.499, 3],
		[2.5, 4],
		// 2.5 mph on the level by the ACSM walking equation.
		[2.914, 4],
		[2.999, 4],
		// The same walk in the Compendium table (PMJ).
		[3, 5],
		[3.999, 5],
		// Slow stair climbing in the same table.
		[4, 6],
		[5, 6],
		[5.001, 'above-table'],
		[5.1, 'above-table']
	])('%d METs: %s', (mets, expected) => {
		const found = levelForMets(mets);
		expect(found.kind === 'level' ? found.level : found.kind).toBe(expected);
	});

	it('has bands that join without a gap', () => {
		const edges = LEVELS.flatMap((level) => [LEVEL_BANDS[level].from, LEVEL_BANDS[level].to]);
		expect(edges).toEqual([1, 1.5, 1.5, 2, 2, 2.5, 2.5, 3, 3, 4, 4, 5]);
	});
});
