import { describe, expect, it } from 'vitest';
import { earlyWarning, OBSERVATIONS, type Observation } from './early-warning';
import type { EarlyWarningInput } from './forms';

// Royal College of Physicians 2017, chart 1 as reproduced, published; totals are computed from the chart.
type Row = [
	rr: number,
	spo2: number,
	scale: 1 | 2,
	oxygen: boolean,
	sbp: number,
	pulse: number,
	consciousness: EarlyWarningInput['consciousness'],
	temperature: number
];

const input = ([
	rr,
	spo2,
	scale,
	oxygen,
	sbp,
	pulse,
	consciousness,
	temperature
]: Row): EarlyWarningInput => ({
	rr,
	spo2,
	scale,
	oxygen,
	sbp,
	pulse,
	consciousness,
	temperature
});

const CALM = input([16, 97, 1, false, 125, 78, 'A', 36.8]);
const AIR = false;
const O2 = true;

/** Rows computed from the RCP chart (bands: scribd.com/document/584338409; second scale: Thorax, markup/192780). */
const ROWS: [Row, string, number, string][] = [
	[[16, 97, 1, AIR, 125, 78, 'A', 36.8], '0,0,0,0,0,0,0', 0, 'low'],
	[[20, 95, 1, AIR, 112, 92, 'A', 38.2], '0,1,0,0,1,0,1', 3, 'low'],
	[[18, 96, 1, AIR, 88, 88, 'A', 36.5], '0,0,0,3,0,0,0', 3, 'low-medium'],
	[[21, 94, 1, O2, 118, 90, 'A', 37.0], '2,1,2,0,0,0,0', 5, 'medium'],
	[[22, 93, 1, O2, 104, 112, 'A', 38.4], '2,2,2,1,2,0,1', 10, 'high'],
	[[24, 94, 1, O2, 98, 134, 'A', 37.2], '2,1,2,2,3,0,0', 10, 'high'],
	[[20, 90, 2, O2, 135, 95, 'A', 36.9], '0,0,2,0,1,0,0', 3, 'low'],
	[[20, 90, 1, O2, 135, 95, 'A', 36.9], '0,3,2,0,1,0,0', 6, 'medium'],
	[[18, 97, 2, O2, 130, 80, 'A', 36.6], '0,3,2,0,0,0,0', 5, 'medium'],
	[[18, 97, 2, AIR, 130, 80, 'A', 36.6], '0,0,0,0,0,0,0', 0, 'low'],
	[[16, 98, 1, AIR, 130, 80, 'C', 37.0], '0,0,0,0,0,3,0', 3, 'low-medium'],
	[[8, 91, 1, O2, 90, 40, 'U', 35.0], '3,3,2,3,3,3,3', 20, 'high'],
	[[12, 96, 1, AIR, 111, 51, 'A', 36.1], '0,0,0,0,0,0,0', 0, 'low'],
	[[20, 96, 1, AIR, 219, 90, 'A', 38.0], '0,0,0,0,0,0,0', 0, 'low'],
	[[21, 95, 1, AIR, 110, 91, 'A', 38.1], '2,1,0,1,1,0,1', 6, 'medium'],
	[[19, 92, 1, AIR, 101, 111, 'A', 39.0], '0,2,0,1,2,0,1', 6, 'medium']
];

describe('the early-warning score', () => {
	it.each(ROWS)('%j scores %s, %d in all, %s', (row, points, total, risk) => {
		const score = earlyWarning(input(row));
		expect(OBSERVATIONS.map((observation) => score.parts[observation]).join()).toBe(points);
		expect(score).toMatchObject({ total, risk, missing: [] });
	});

	// Each band of the chart at both of its ends.
	it.each<[Observation, [number, number][]]>([
		[
			'rr',
			[
				[8, 3],
				[9, 1],
				[11, 1],
				[12, 0],
				[20, 0],
				[21, 2],
				[24, 2],
				[25, 3]
			]
		],
		[
			'spo2',
			[
				[91, 3],
				[92, 2],
				[93, 2],
				[94, 1],
				[95, 1],
				[96, 0]
			]
		],
		[
			'sbp',
			[
				[90, 3],
				[91, 2],
				[100, 2],
				[101, 1],
				[110, 1],
				[111, 0],
				[219, 0],
				[220, 3]
			]
		],
		[
			'pulse',
			[
				[40, 3],
				[41, 1],
				[50, 1],
				[51, 0],
				[90, 0],
				[91, 1],
				[110, 1],
				[111, 2],
				[130, 2],
				[131, 3]
			]
		],
		[
			'temperature',
			[
				[35, 3],
				[35.1, 1],
				[36, 1],
				[36.1, 0],
				[38, 0],
				[38.1, 1],
				[39, 1],
				[39.1, 2]
			]
		]
	])('%s', (observation, ends) => {
		for (const [value, points] of ends) {
			expect([value, earlyWarning({ ...CALM, [observation]: value }).parts[observation]]).toEqual([
				value,
				points
			]);
		}
	});

	it.each([
		[
			AIR,
			[
				[83, 3],
				[84, 2],
				[85, 2],
				[86, 1],
				[87, 1],
				[88, 0],
				[92, 0],
				[93, 0],
				[100, 0]
			]
		],
		[
			O2,
			[
				[83, 3],
				[84, 2],
				[86, 1],
				[88, 0],
				[92, 0],
				[93, 1],
				[94, 1],
				[95, 2],
				[96, 2],
				[97, 3]
			]
		]
	] as const)('second scale, oxygen %s', (oxygen, ends) => {
		for (const [spo2, points] of ends) {
			expect([spo2, earlyWarning({ ...CALM, scale: 2, oxygen, spo2 }).parts.spo2]).toEqual([spo2, points]);
		}
	});

	it.each([
		[36.04, 1],
		[36.05, 0],
		[38.04, 0],
		[38.05, 1]
	])('%d degrees is read to a tenth', (temperature, points) => {
		expect(earlyWarning({ ...CALM, temperature }).parts.temperature).toBe(points);
	});

	it.each(['C', 'V', 'P', 'U'] as const)('%s scores 3', (consciousness) => {
		expect(earlyWarning({ ...CALM, consciousness }).total).toBe(3);
	});

	it('uses the first scale unless the second was chosen', () => {
		expect(earlyWarning({ ...CALM, scale: undefined, spo2: 90 }).parts.spo2).toBe(3);
	});
});

describe('a missing observation', () => {
	it.each(OBSERVATIONS)('%s leaves no total, and is named', (observation) => {
		for (const missing of [null, undefined]) {
			const score = earlyWarning({ ...CALM, [observation]: missing });
			expect(score).toMatchObject({ total: null, missing: [observation], risk: null, response: null });
			expect(score.parts[observation]).toBeNull();
		}
	});

	it('of oxygen leaves a high saturation on the second scale unread, and a low one not', () => {
		const at = (spo2: number) => earlyWarning({ ...CALM, scale: 2, oxygen: null, spo2 }).missing;
		expect(at(95)).toEqual(['spo2', 'oxygen']);
		expect(at(90)).toEqual(['oxygen']);
	});
});

it.each([
	[CALM, /12 hours/],
	[{ ...CALM, pulse: 95 }, /4 to 6 hours/],
	[{ ...CALM, sbp: 88 }, /every hour; the nurse informs the medical team, who decide/],
	[{ ...CALM, sbp: 88, oxygen: true }, /urgent assessment/],
	[{ ...CALM, sbp: 88, oxygen: true, rr: 22 }, /Continuous observation/]
])('says who does what how soon', (observations, words) => {
	expect(earlyWarning(observations).response).toMatch(words);
});
