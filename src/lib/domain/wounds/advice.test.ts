import { expect, it } from 'vitest';
import { woundAdvice } from './advice';
import type { SternumFinding, WoundFinding } from './codes';

// Scale: El-Ansary 2018 (doi 10.15344/2455-7498/2018/140); what follows from it is from memory.
it.each<[WoundFinding | null, SternumFinding | null, boolean, boolean]>([
	[null, null, false, false],
	['dry', 'stable', false, false],
	['moist', 'stable', false, false],
	['weeping', 'stable', true, false],
	['open', null, true, false],
	['dry', 'click', true, false],
	['dry', 'moves', true, true],
	[null, 'moves', true, true]
])('%s and %s: tell the surgeon %s, stop the arms %s', (wound, sternum, tellSurgeon, stopArms) => {
	expect(woundAdvice({ wound, sternum })).toEqual({ tellSurgeon, stopArms });
});
