import { describe, expect, it } from 'vitest';
import { precautionsOf } from '$lib/domain/episodes/precautions';
import { precautionLines } from './precaution-lines';

const operation = { approach: 'sternotomy', day: '2026-03-01', begun: true } as const;
const reader = (now: string) => ({ zone: 'Europe/Dublin', now: Date.parse(now) });
const words = (armStage: Parameters<typeof precautionsOf>[1], now = '2026-03-03T09:00:00Z') =>
	precautionLines(precautionsOf(operation, armStage, false), reader(now)).map((line) => line.words);

describe('what holds under sternal precautions', () => {
	// Before the arm stage 45 degrees, after it 90 where none is stated: common practice, no published source.
	it.each([
		[null, 'Either arm to 45 degrees at most, and lifts no load.', 'Not cleared.'],
		[
			{ maxElevationDeg: null, maxLoadKg: null, reviewOn: null },
			'Either arm to 90 degrees at most, and lifts no load.',
			'Cleared, without a day of review.'
		],
		[
			{ maxElevationDeg: 70, maxLoadKg: 2.5, reviewOn: '2026-03-12' },
			'Either arm to 70 degrees at most, and lifts up to 2.5 kg.',
			'Cleared; to be reviewed on Thu 12 Mar'
		]
	])('with the arm stage %j', (armStage, now, stage) => {
		const [first, second] = words(armStage);
		expect(first).toBe(now);
		expect(second).toContain(stage);
	});

	it.each([
		['2026-04-25T22:59:59Z', 'Due on Sun 26 Apr'],
		['2026-04-25T23:00:00Z', 'Fell due on Sun 26 Apr']
	])('at %s their end: %s', (now, end) => {
		expect(words(null, now).at(-1)).toContain(end);
	});
});
