import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { signInAs, type Client } from '../support/api';
import { startProduct, type Product } from '../support/server';

/**
 * The calculators as a program meets them: names, shapes and numbers over HTTP. The numbers are worked out from the
 * published formulas by hand, apart from the code; where one stands in print, its source says so.
 */

let product: Product;
let nurse: Client;

beforeAll(async () => {
	product = await startProduct({ env: { RATE_LIMIT_SCALE: '1000' } });
	nurse = await signInAs(product.url, 'nurse');
});
afterAll(() => product?.stop());

/** The answer of a calculator that took its body. */
async function worked(name: string, body: object): Promise<Record<string, unknown>> {
	const answer = await nurse.post(`/api/calculate/${name}`, body);
	expect(answer.status, JSON.stringify(answer.body)).toBe(200);
	return answer.body as Record<string, unknown>;
}

/** Numbers are as near as the last digit that is written; everything else is exactly so. */
function expectAnswer(answer: Record<string, unknown>, expected: Record<string, unknown>, digits = 2): void {
	for (const [name, value] of Object.entries(expected)) {
		if (typeof value === 'number') {
			expect(answer[name], name).toBeCloseTo(value, digits);
		} else {
			expect(answer[name], name).toEqual(value);
		}
	}
}

const SCORED = {
	rr: 16,
	spo2: 97,
	scale: 1,
	oxygen: false,
	sbp: 125,
	pulse: 78,
	consciousness: 'A',
	temperature: 36.8
};

// Bands: chart 1 of the Royal College of Physicians as reproduced (published); totals computed.
describe('early-warning', () => {
	it.each([
		[{}, 0],
		[{ rr: 20, spo2: 95, sbp: 112, pulse: 92, temperature: 38.2 }, 3],
		[{ sbp: 88, rr: 18, spo2: 96, pulse: 88, temperature: 36.5 }, 3],
		[{ rr: 22, spo2: 93, oxygen: true, sbp: 104, pulse: 112, temperature: 38.4 }, 10],
		[{ rr: 20, spo2: 90, scale: 2, oxygen: true, sbp: 135, pulse: 95, temperature: 36.9 }, 3],
		[{ rr: 20, spo2: 90, oxygen: true, sbp: 135, pulse: 95, temperature: 36.9 }, 6],
		[{ rr: 18, spo2: 97, scale: 2, oxygen: true, sbp: 130, pulse: 80, temperature: 36.6 }, 5],
		[{ consciousness: 'C' }, 3],
		[{ rr: 8, spo2: 91, oxygen: true, sbp: 90, pulse: 40, consciousness: 'U', temperature: 35 }, 20],
		[{ rr: 12, spo2: 96, sbp: 111, pulse: 51, temperature: 36.1 }, 0],
		[{ rr: 20, spo2: 96, sbp: 219, pulse: 90, temperature: 38 }, 0],
		[{ rr: 21, spo2: 95, sbp: 110, pulse: 91, temperature: 38.1 }, 6]
	])('%j: %d', async (change, total) => {
		const answer = await worked('early-warning', { ...SCORED, ...change });
		expect(answer.total).toBe(total);
		expect(Object.values(answer.parts as object).reduce((sum, part) => sum + part, 0)).toBe(total);
		expect(answer.response).toEqual(expect.any(String));
	});

	it('with a value missing has no total, and says which', async () => {
		const { temperature: _missing, ...body } = SCORED;
		const answer = await worked('early-warning', body);
		expect(answer).toMatchObject({ total: null, missing: ['temperature'], response: null });
	});
});

// Equations: ACSM (published; arm cycling and some ranges from memory). In print: 29.76, about 20, and 31.4.
describe('energy', () => {
	it.each([
		[{ mode: 'walk', speedMPerMin: 53.6 }, 8.86, 2.531, true],
		[{ mode: 'walk', speedMPerMin: 67, grade: 0.05 }, 16.23, 4.637, true],
		[{ mode: 'walk', speedMPerMin: 93.8, grade: 0.1 }, 29.764, 8.504, true],
		[{ mode: 'walk', speedMPerMin: 40.2 }, 7.52, 2.149, false],
		[{ mode: 'run', speedMPerMin: 160.8 }, 35.66, 10.189, true],
		[{ mode: 'run', speedMPerMin: 160.8, grade: 0.01 }, 37.107, 10.602, true],
		[{ mode: 'step', stepsPerMin: 30, stepHeightM: 0.3048 }, 31.391, 8.969, true],
		[{ mode: 'step', stepsPerMin: 20, stepHeightM: 0.2 }, 17.076, 4.879, true],
		[{ mode: 'leg-cycle', watts: 50, weightKg: 80 }, 13.75, 3.929, true],
		[{ mode: 'leg-cycle', watts: 75, weightKg: 62 }, 20.065, 5.733, true],
		[{ mode: 'arm-cycle', watts: 25, weightKg: 75 }, 9.62, 2.749, true]
	])('%j', async (body, vo2, mets, inRange) => {
		expectAnswer(await worked('energy', body), { vo2, mets, inRange }, 3);
	});
});

// By reserve: Whitworth University (published); methods of the maximum published, rows computed.
describe('heart-rate-target', () => {
	const fractions = [0.4, 0.5, 0.6, 0.7, 0.8];

	it.each([
		[{ age: 65, resting: 72, method: '220-age' }, 155, [105.2, 113.5, 121.8, 130.1, 138.4]],
		[{ age: 65, resting: 72, method: '208-0.7age' }, 162.5, [108.2, 117.25, 126.3, 135.35, 144.4]],
		[{ age: 65, resting: 62, method: '164-0.7age' }, 118.5, [84.6, 90.25, 95.9, 101.55, 107.2]],
		[{ age: 58, resting: 80, method: '220-age' }, 162, [112.8, 121, 129.2, 137.4, 145.6]],
		[{ age: 74, resting: 68, method: '164-0.7age' }, 112.2, [85.68, 90.1, 94.52, 98.94, 103.36]]
	])('%j', async (body, maximum, targets) => {
		const answer = await worked('heart-rate-target', { ...body, fractions });
		expect(answer.maximum).toBeCloseTo(maximum, 6);
		expect(answer.targets).toEqual(targets.map((target) => expect.closeTo(target, 6)));
	});
});

// Equations: European Respiratory Journal (published); lower limits from memory; rows computed.
describe('walk-test', () => {
	it.each([
		[{ sex: 'male', heightCm: 172, ageYears: 65, weightKg: 80, distanceM: 400 }, 525.94, 372.94, 76.05, true],
		[{ sex: 'male', heightCm: 180, ageYears: 55, weightKg: 90 }, 619.1, 466.1, null, true],
		[{ sex: 'male', heightCm: 165, ageYears: 78, weightKg: 70 }, 425.29, 272.29, null, true],
		[
			{ sex: 'female', heightCm: 160, ageYears: 70, weightKg: 68, distanceM: 310 },
			444.28,
			305.28,
			69.78,
			true
		],
		[{ sex: 'female', heightCm: 152, ageYears: 80, weightKg: 55 }, 399.37, 260.37, null, true],
		[{ sex: 'female', heightCm: 152, ageYears: 81, weightKg: 55 }, 393.59, 254.59, null, false],
		[{ sex: 'unknown', heightCm: 160, ageYears: 70, weightKg: 68 }, null, null, null, false]
	])('%j', async (body, predictedM, lowerLimitM, percent, inRange) => {
		expectAnswer(await worked('walk-test', body), { predictedM, lowerLimitM, percent, inRange });
	});
});

// 120/80 with a mean of 93.3: WikiLectures (published); the other rows computed.
describe('pressures', () => {
	it.each([
		[{ hr: 70, sbp: 120, dbp: 80 }, 93.333, 40, 8400, 0.583],
		[{ hr: 72, sbp: 118, dbp: 62 }, 80.667, 56, 8496, 0.61],
		[{ hr: 110, sbp: 90, dbp: 50 }, 63.333, 40, 9900, 1.222],
		[{ hr: 130, sbp: 200, dbp: 100 }, 133.333, 100, 26000, 0.65]
	])('%j', async (body, map, pulsePressure, ratePressureProduct, shockIndex) => {
		expectAnswer(await worked('pressures', body), { map, pulsePressure, ratePressureProduct, shockIndex }, 3);
	});
});

// Alphabet and lengths: 3GPP TS 23.038 (published).
describe('sms', () => {
	it.each([
		['', 'gsm7', 0, 0],
		['a'.repeat(160), 'gsm7', 160, 1],
		['a'.repeat(161), 'gsm7', 161, 2],
		[`${'a'.repeat(158)}€`, 'gsm7', 160, 1],
		[`${'a'.repeat(152)}€${'a'.repeat(152)}`, 'gsm7', 306, 3],
		['ж'.repeat(70), 'ucs2', 70, 1],
		[`${'ж'.repeat(66)}😀${'ж'.repeat(66)}`, 'ucs2', 134, 3]
	])('%#', async (text, encoding, units, segments) => {
		expect(await worked('sms', { text })).toEqual({ encoding, units, segments });
	});
});

it.each([
	['early-warning', { ...SCORED, rr: 61 }, '/rr', 'rr is 61: it must be a number from 4 to 60 breaths/min.'],
	['energy', { mode: 'swim' }, '/mode', 'mode is "swim"'],
	['energy', { mode: 'leg-cycle', watts: 50 }, '/weightKg', 'weightKg is missing'],
	[
		'heart-rate-target',
		{ age: 65, resting: 155, method: '220-age', fractions: [0.5] },
		'/resting',
		'resting is 155'
	],
	['walk-test', { sex: 'x', heightCm: 160, ageYears: 70, weightKg: 68 }, '/sex', 'sex is "x"'],
	['pressures', { hr: 70, sbp: 80, dbp: 80 }, '/sbp', 'sbp is 80 and dbp is 80']
])('%s refuses %j at %s', async (name, body, pointer, words) => {
	const answer = await nurse.post(`/api/calculate/${name}`, body);
	expect(answer.status).toBe(422);
	expect(answer.headers.get('content-type')).toBe('application/problem+json');
	const [error] = answer.body.errors as unknown as { pointer: string; message: string }[];
	expect(error?.pointer).toBe(pointer);
	expect(error?.message).toContain(words);
});
