import { expect, it } from 'vitest';
import { CLEARANCE_KINDS } from '../core/codes';
import { kindsIn } from './kinds';

it('leaves an outpatient what counts at home and in the programme', () => {
	expect(kindsIn('outpatient')).toEqual(['arm-stage', 'treadmill', 'precautions-end']);
	expect(kindsIn('inpatient')).toEqual(CLEARANCE_KINDS);
});
