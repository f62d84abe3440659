import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { earlyWarningBody, energyBody, heartRateTargetBody, pressuresBody, walkTestBody } from './forms';

function complaints(schema: z.ZodType, value: unknown): string[] {
	const result = schema.safeParse(value);
	return result.success
		? []
		: result.error.issues.map(({ path, message }) => `/${path.join('/')}: ${message}`);
}

const target = { age: 65, resting: 72, method: '220-age', fractions: [0.4] };
const walk = { sex: 'male', ageYears: 65, heightCm: 172, weightKg: 80 };

describe('what is refused, and how', () => {
	it.each<[string, z.ZodType, unknown, string]>([
		[
			'an impossible pulse',
			earlyWarningBody,
			{ pulse: 251 },
			'/pulse: pulse is 251: it must be a number from 20 to 250 beats/min.'
		],
		['a third scale', earlyWarningBody, { scale: 3 }, '/scale: scale is 3: it must be 1 or 2.'],
		[
			'an unknown consciousness',
			earlyWarningBody,
			{ consciousness: 'X' },
			'/consciousness: consciousness is "X": it must be one of A, C, V, P, U.'
		],
		['oxygen in litres', earlyWarningBody, { oxygen: 2 }, '/oxygen: oxygen is 2: it must be true or false.'],
		[
			'a walk without a speed',
			energyBody,
			{ mode: 'walk' },
			'/speedMPerMin: speedMPerMin is missing: it must be a number from 0 to 450 m/min.'
		],
		[
			'a grade in per cent',
			energyBody,
			{ mode: 'walk', speedMPerMin: 70, grade: 5 },
			'/grade: grade is 5: it must be a number from 0 to 0.5 as a fraction (0.05 is 5 %).'
		],
		[
			'a bicycle without a weight',
			energyBody,
			{ mode: 'leg-cycle', watts: 50 },
			'/weightKg: weightKg is missing: it must be a number from 25 to 300 kg.'
		],
		[
			'steps without a height',
			energyBody,
			{ mode: 'step', stepsPerMin: 20 },
			'/stepHeightM: stepHeightM is missing: it must be a number from 0 to 1 m.'
		],
		[
			'an unknown kind of work',
			energyBody,
			{ mode: 'swim' },
			'/mode: mode is "swim": it must be one of walk, run, step, leg-cycle, arm-cycle.'
		],
		[
			'no kind of work',
			energyBody,
			{},
			'/mode: mode is missing: it must be one of walk, run, step, leg-cycle, arm-cycle.'
		],
		['no object', energyBody, 'walk', '/: the body is "walk": it must be an object.'],
		[
			'an unknown method',
			heartRateTargetBody,
			{ ...target, method: '200-age' },
			'/method: method is "200-age": it must be one of 220-age, 208-0.7age, 164-0.7age.'
		],
		[
			'per cent for a fraction',
			heartRateTargetBody,
			{ ...target, fractions: [40] },
			'/fractions/0: a fraction is 40: it must be a number from 0 to 1 as a fraction (0.4 is 40 %).'
		],
		[
			'no fraction',
			heartRateTargetBody,
			{ ...target, fractions: [] },
			'/fractions: fractions is empty: it must hold at least one number.'
		],
		[
			'a child',
			heartRateTargetBody,
			{ ...target, age: 15 },
			'/age: age is 15: it must be a number from 16 to 110 years.'
		],
		[
			'a resting rate at the maximum',
			heartRateTargetBody,
			{ ...target, resting: 155 },
			'/resting: resting is 155: it must lie below the maximum of 155 that 220-age predicts.'
		],
		[
			'an unknown sex',
			walkTestBody,
			{ ...walk, sex: 'm' },
			'/sex: sex is "m": it must be one of male, female, other, unknown.'
		],
		[
			'a height in metres',
			walkTestBody,
			{ ...walk, heightCm: 1.72 },
			'/heightCm: heightCm is 1.72: it must be a number from 120 to 220 cm.'
		],
		[
			'a walk of 1001 m',
			walkTestBody,
			{ ...walk, distanceM: 1001 },
			'/distanceM: distanceM is 1001: it must be a number from 0 to 1000 m.'
		],
		[
			'a missing pulse',
			pressuresBody,
			{ sbp: 120, dbp: 80 },
			'/hr: hr is missing: it must be a number from 20 to 250 beats/min.'
		],
		[
			'a diastolic above',
			pressuresBody,
			{ hr: 70, sbp: 80, dbp: 120 },
			'/sbp: sbp is 80 and dbp is 120: the systolic pressure must be above the diastolic.'
		]
	])('%s', (_what, schema, value, message) => {
		expect(complaints(schema, value)).toEqual([message]);
	});
});

describe('what is accepted', () => {
	it.each<[string, z.ZodType, unknown]>([
		['no observation at all', earlyWarningBody, {}],
		[
			'observations at the bounds',
			earlyWarningBody,
			{ rr: 4, spo2: 50, sbp: 50, pulse: 20, temperature: 30 }
		],
		['a walk on the level', energyBody, { mode: 'walk', speedMPerMin: 70 }],
		['a resting rate just under the maximum', heartRateTargetBody, { ...target, resting: 154.9 }],
		['a walk that was not walked', walkTestBody, walk],
		['an unknown sex that says so', walkTestBody, { ...walk, sex: 'unknown' }],
		['a reading', pressuresBody, { hr: 70, sbp: 120, dbp: 80 }]
	])('%s', (_what, schema, value) => {
		expect(complaints(schema, value)).toEqual([]);
	});

	it('can be described as JSON Schema', () => {
		for (const schema of [earlyWarningBody, energyBody, heartRateTargetBody, walkTestBody, pressuresBody]) {
			expect(() => z.toJSONSchema(schema, { io: 'input' })).not.toThrow();
		}
	});
});
