import { describe, expect, it } from 'vitest';
import type { Level } from '../core/codes';
import { levelAfter, measuresAgain, rhythmAtEnd, todayAfter } from './carry-over';
import { OUTCOMES, type Outcome } from './codes';
import type { ActivityDone } from './forms';
import { session } from './testing/sample';

const WALK: ActivityDone = { code: 'hall-walk' }; // level 4
const LONG_WALK: ActivityDone = { code: 'hall-walk-long' }; // level 5

describe('the level after a session', () => {
	it.each<[string, number, Level, Outcome, ActivityDone[], number]>([
		['something of the level was done', 3, 4, 'clear', [WALK], 4],
		['with a caution it counts', 3, 4, 'caution', [WALK], 4],
		['something harder was done: the level that is claimed', 3, 4, 'clear', [LONG_WALK], 4],
		['only something easier was done', 3, 5, 'clear', [WALK], 3],
		['easier and of the level', 3, 5, 'clear', [WALK, LONG_WALK], 5],
		['it was planned and not done', 3, 4, 'clear', [{ ...WALK, notDone: true }], 3],
		['nothing was done', 3, 4, 'clear', [], 3],
		['below what was reached', 5, 4, 'clear', [WALK], 5],
		['at what was reached', 4, 4, 'clear', [WALK], 4]
	])('%s', (_, reached, level, outcome, activities, after) => {
		expect(levelAfter(reached, { level, outcome, activities })).toBe(after);
	});

	it.each(OUTCOMES)('with the outcome %s rises only when it went well', (outcome) => {
		const after = levelAfter(3, { level: 4, outcome, activities: [WALK] });
		expect(after).toBe(outcome === 'clear' || outcome === 'caution' ? 4 : 3);
	});
});

describe('today’s level after a session', () => {
	it.each<[string, number, Level, Outcome, boolean, number]>([
		['one level up, done well', 3, 4, 'clear', false, 4],
		['at today’s level', 4, 4, 'clear', false, 4],
		['below it', 5, 4, 'clear', false, 5],
		['two levels at once', 2, 4, 'clear', false, 2],
		['two levels at once, by a senior', 2, 4, 'clear', true, 2],
		['one level up with a caution', 3, 4, 'caution', false, 3],
		['one level up with a caution, by a senior', 3, 4, 'caution', true, 4],
		['one level up, stopped', 3, 4, 'stop', true, 3],
		['one level up, not all measured', 3, 4, 'incomplete', true, 3]
	])('%s', (_, today, level, outcome, senior, after) => {
		expect(todayAfter(today, { level, outcome, activities: [WALK] }, senior)).toBe(after);
	});
});

describe('measuring again', () => {
	it.each([
		['a pulse before', { before: { hr: 80 } }, true],
		['a systolic pressure afterwards', { after: { sbp: 120 } }, true],
		['a diastolic pressure in effort', { during: [{ dbp: 70 }] }, true],
		['nothing', {}, false],
		['saturation and pain alone', { before: { spo2: 96, pain: 2 } }, false],
		['a pulse that was sent as not measured', { before: { hr: null, sbp: null, dbp: null } }, false]
	])('by %s: %s', (_, readings, measured) => {
		expect(measuresAgain({ before: {}, during: [], after: {}, ...readings })).toBe(measured);
	});
});

describe('the rhythm at the end of a session', () => {
	const AF = { rhythm: 'atrial-fibrillation' } as const;
	it.each([
		['the one that was asked for', {}, 'sinus'],
		['a new one before', { before: AF }, 'atrial-fibrillation'],
		['the last that was stated', { before: AF, during: [{}, { rhythm: 'paced' as const }, {}] }, 'paced'],
		['the one after effort', { during: [AF], after: { rhythm: 'sinus' as const } }, 'sinus']
	])('is %s', (_, readings, rhythm) => {
		const { context } = session({ context: { rhythm: 'sinus' } });
		expect(rhythmAtEnd({ context, before: {}, during: [], after: {}, ...readings })).toBe(rhythm);
	});
});
