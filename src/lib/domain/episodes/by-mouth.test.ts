import { describe, expect, it } from 'vitest';
import type { ClearanceState } from '../core/codes';
import { nothingByMouth } from './by-mouth';

describe('nothingByMouth', () => {
	it.each<[ClearanceState | null, boolean, boolean]>([
		[null, false, false],
		[null, true, true],
		['asked', false, true],
		['given', true, false],
		['given-with-limits', true, false],
		['withheld', false, true],
		['on-hold', false, true],
		['withdrawn', false, true],
		['lapsed', false, true]
	])('cleared: %s, a tube on record: %s: %s', (clearance, tubed, nothing) => {
		expect(nothingByMouth(clearance, tubed)).toBe(nothing);
	});
});
