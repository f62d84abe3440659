import { describe, expect, it } from 'vitest';
import type { Reading } from './forms';
import { session } from './testing/sample';
import { hasValues, placeReadings } from './timeline';

const bare = (readings: Reading[]) => {
	const [before = {}, ...rest] = readings;
	const after = rest.at(-1) ?? {};
	return { ...session(), before, during: rest.slice(0, -1), after };
};

describe('placeReadings', () => {
	it('keeps the order: before, during, after', () => {
		expect(placeReadings(session()).map(({ moment }) => moment)).toEqual([
			'before',
			'during',
			'during',
			'after'
		]);
		expect(placeReadings(session({ during: [] }))).toHaveLength(2);
	});

	it.each([
		[
			['lying', null, 'standing', null],
			['lying', 'lying', 'standing', 'standing'],
			[0, 0, 1, 1]
		],
		[
			[null, null, 'sitting', null],
			['sitting', 'sitting', 'sitting', 'sitting'],
			[0, 0, 0, 0]
		],
		[
			[null, null, null],
			[null, null, null],
			[0, 0, 0]
		],
		[
			['lying', 'sitting', 'lying', 'lying'],
			['lying', 'sitting', 'lying', 'lying'],
			[0, 1, 2, 2]
		]
	] as const)('carries the posture through %j', (stated, postures, stays) => {
		const placed = placeReadings(bare(stated.map((posture) => ({ posture }))));
		expect(placed.map(({ posture }) => posture)).toEqual(postures);
		expect(placed.map(({ stay }) => stay)).toEqual(stays);
	});

	it('carries the source of pressure and the rhythm', () => {
		const placed = placeReadings(
			bare([{}, { bpSource: 'arterial', rhythm: 'paced' }, {}, { bpSource: 'cuff', rhythm: 'sinus' }])
		);
		expect(placed.map(({ source }) => source)).toEqual(['arterial', 'arterial', 'arterial', 'cuff']);
		expect(placed.map(({ rhythm }) => rhythm)).toEqual(['sinus', 'paced', 'paced', 'sinus']);
	});
});

describe('hasValues', () => {
	it.each([
		[{}, false],
		[{ posture: 'sitting', work: 3, oxygenLpm: 2 }, false],
		[{ hr: null }, false],
		[{ pain: 0 }, true],
		[{ rpe: 11 }, true]
	] as const)('%j: %s', (reading, expected) => {
		expect(hasValues(reading)).toBe(expected);
	});
});
