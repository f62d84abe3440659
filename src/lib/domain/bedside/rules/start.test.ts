import { describe, expect, it } from 'vitest';
import { grades, judge, only } from '../testing/sample';

// Critical Care Research and Practice 2020, early mobilisation in intensive care, table 6 (published).
const BARS = ['vasopressorRising', 'balloonPump', 'pacingDependent', 'bleeding'] as const;

describe('start-check', () => {
	it.each(BARS)('%s bars the start, and not stated is not absent', (bar) => {
		const verdict = judge({ context: { [bar]: true } });
		expect(grades(verdict, 'start-check')).toEqual(['stop before']);
		expect(only(verdict, 'start-check')).toMatchObject({ measured: bar, limit: null });
		expect(judge({ context: { [bar]: undefined } }).notJudged).toContain('start-check');
		expect(judge({ context: { [bar]: null } }).notJudged).toContain('start-check');
	});

	it('names each of several', () => {
		const verdict = judge({ context: { balloonPump: true, bleeding: true } });
		expect(grades(verdict, 'start-check')).toEqual(['stop before', 'stop before']);
	});

	it('is silent and judged when all are denied', () => {
		expect(grades(judge(), 'start-check')).toEqual([]);
		expect(judge().notJudged).not.toContain('start-check');
	});
});

describe('temperature-ceiling', () => {
	// 38.5: early mobilisation 2020, table 5 (published). 38: BMJ Open, table of contraindications (published).
	it.each([
		[38, []],
		[38.1, ['caution before']],
		[38.5, ['caution before']],
		[38.6, ['stop before']],
		[30, []]
	])('%d °C', (temperature, found) => {
		for (const set of ['strict', 'guideline', 'outpatient'] as const) {
			expect(grades(judge({ context: { set, temperature } }), 'temperature-ceiling')).toEqual(found);
		}
	});

	// Common practice, no published source.
	it('is unjudged when nobody took it', () => {
		expect(judge({ context: { temperature: undefined } }).notJudged).toEqual(['temperature-ceiling']);
	});
});
