import { describe, expect, it } from 'vitest';
import type { Rhythm } from '../core/codes';
import { notKnown, type Deciding } from './may-do-now';
import type { PrecautionsBasis } from './precautions';

describe('notKnown', () => {
	it.each<['inpatient' | 'outpatient', PrecautionsBasis, boolean, boolean | null, Rhythm | null, Deciding[]]>(
		[
			['outpatient', 'performed', true, false, 'sinus', []],
			['outpatient', 'performed', false, true, 'paced', []],
			['outpatient', 'none', false, null, null, ['operation', 'drug', 'rhythm']],
			['outpatient', 'none', false, true, 'sinus', ['operation']],
			['outpatient', 'performed', true, null, 'sinus', ['drug']],
			['outpatient', 'performed', true, false, null, ['rhythm']],
			// On the ward the level decides; drug and rhythm are asked at each session.
			['inpatient', 'performed', true, null, null, []],
			['inpatient', 'none', false, null, null, ['operation']],
			// That it is to come is known: levels do not count yet, and are not shown.
			['inpatient', 'planned', false, null, null, []]
		]
	)(
		'%s, operation %s, sternal %s, drug %s, rhythm %s: %j',
		(phase, basis, sternal, betaBlocked, rhythm, missing) => {
			expect(notKnown({ phase, precautions: { basis, sternal }, betaBlocked, rhythm })).toEqual(missing);
		}
	);
});
