import { describe, expect, it } from 'vitest';
import { LEVELS, type ClearanceKind } from '../core/codes';
import { activitiesUpTo, activityByCode } from './activities/activities';
import { LEVEL_BANDS, levelForMets } from './levels';
import { grades, judge } from './testing/sample';

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

	// Stairs are 4.0 METs in the Compendium table (published), so that they belong to level 6; bands from memory.
	it('keeps the stairs from a patient at level 4 until they are cleared', () => {
		expect(levelForMets(4)).toMatchObject({ kind: 'level', level: activityByCode('stairs').level });
		expect(activitiesUpTo(4).map(({ code }) => code)).not.toContain('stairs');
		const stairs = (clearances: ClearanceKind[]) =>
			grades(
				judge({ context: { level: 4, clearances }, activities: [{ code: 'stairs', helper: true }] }),
				'clearance-missing'
			);
		expect([stairs([]), stairs(['stairs'])]).toEqual([['stop during'], []]);
	});

	it('has bands that join without a gap', () => {
		const edges = LEVELS.flatMap((level) => [LEVEL_BANDS[level].from, LEVEL_BANDS[level].to]);
		expect(edges).toEqual([1, 1.5, 1.5, 2, 2, 2.5, 2.5, 3, 3, 4, 4, 5]);
	});
});
