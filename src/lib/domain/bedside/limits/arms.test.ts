import { describe, expect, it } from 'vitest';
import { armLimitOf } from './arms';
import { limitsOfPatient, type PatientLimit, type UnitChange } from './layers';

const unit = (value: number): UnitChange => ({
	...{ version: 1, set: 'strict', key: 'arm-elevation.cleared', value },
	...{ agreedBy: 'Maeve Tidewell', agreedOn: '2026-02-02' }
});
const patient = (value: number, key: PatientLimit['key'] = 'arm-elevation.cleared'): PatientLimit => ({
	...{ version: 1, key, value, setBy: 'Orla Marsh', untilOn: '2026-03-05' }
});

// 45 and 90 degrees: common practice, no published source.
describe('armLimitOf', () => {
	it.each([
		['nothing cleared', [], [], null, 45],
		['cleared, no height stated', [], [], { maxElevationDeg: null }, 90],
		['cleared to 60', [], [], { maxElevationDeg: 60 }, 60],
		['cleared to 120', [], [], { maxElevationDeg: 120 }, 120],
		['cleared to 120, 80 in the unit', [unit(80)], [], { maxElevationDeg: 120 }, 120],
		['cleared, no height stated, 80 in the unit', [unit(80)], [], { maxElevationDeg: null }, 80],
		['cleared to 90, 60 for the patient', [], [patient(60)], { maxElevationDeg: 90 }, 60],
		['cleared to 60, 60 for the patient', [], [patient(60)], { maxElevationDeg: 60 }, 60],
		['cleared to 59, 60 for the patient', [], [patient(60)], { maxElevationDeg: 59 }, 59],
		['cleared, 60 for the patient', [], [patient(60)], { maxElevationDeg: null }, 60],
		['nothing cleared, 30 for the patient', [], [patient(30, 'arm-elevation')], null, 30]
	])('%s', (_what, changes, own, clearance, degrees) => {
		const limits = limitsOfPatient('strict', { unit: changes, patient: own });
		expect(armLimitOf(limits, clearance)?.value).toBe(degrees);
	});

	it('says whose limit it is', () => {
		const limits = limitsOfPatient('strict', { unit: [], patient: [patient(60)] });
		expect(armLimitOf(limits, { maxElevationDeg: 90 })?.version).toBe('patient 1');
		expect(armLimitOf(limits, { maxElevationDeg: 45 })?.version).toBe('clearance');
	});
});
