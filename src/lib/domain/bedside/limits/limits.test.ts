import { describe, expect, it } from 'vitest';
import { LIMIT_KEYS, SETS } from '../codes';
import { judge, only } from '../testing/sample';
import { assess } from '../assess';
import { session } from '../testing/sample';
import { crosses, limitsFor, overrideLimits, setFor } from './limits';
import { SOURCES } from './sources';
import { DEFAULT_LIMITS } from './table';

describe('setFor', () => {
	it.each([
		[undefined, undefined, 'strict'],
		[undefined, 'inpatient', 'strict'],
		[undefined, 'outpatient', 'outpatient'],
		['guideline', undefined, 'guideline'],
		['strict', 'outpatient', 'strict'],
		[null, null, 'strict']
	] as const)('set %s, phase %s: %s', (set, phase, expected) => {
		expect(setFor({ set, phase })).toBe(expected);
	});
});

describe('crosses', () => {
	it.each([
		['over', 10, 10, false],
		['over', 10, 10.000001, true],
		['at', 10, 9.999999, false],
		['at', 10, 10, true],
		['under', 10, 10, false],
		['under', 10, 9.999999, true],
		// Differences that binary fractions get wrong by a hair.
		['over', 0.1, 0.3 - 0.2, false],
		['at', 9.6, 91.6 - 82, true],
		['under', 60, 60 - 1e-12, false]
	] as const)('%s %d: %d is %s', (when, value, measured, expected) => {
		expect(crosses({ when, value }, measured)).toBe(expected);
	});
});

describe('the default tables', () => {
	it.each(SETS)('%s has every limit, with a unit and a source that exists', (set) => {
		expect(Object.keys(DEFAULT_LIMITS[set]).sort()).toEqual([...LIMIT_KEYS].sort());
		for (const limit of Object.values(DEFAULT_LIMITS[set])) {
			expect(limit === null || (limit.unit !== '' && limit.source in SOURCES)).toBe(true);
		}
	});

	it.each([
		['strict', []],
		['guideline', ['systolic-rise']],
		['outpatient', ['systolic-rise', 'heart-rate-rise', 'heart-rate-rise.beta-blocked']]
	] as const)('%s switches off %j', (set, off) => {
		expect(LIMIT_KEYS.filter((key) => limitsFor(set).limits[key] === null)).toEqual(off);
	});

	it('cite their source and say how weak it is', () => {
		const cited = LIMIT_KEYS.map((key) => limitsFor('strict').limits[key]?.source ?? '');
		expect(
			cited.filter((source) => source.includes('(from memory, not yet verified)')).length
		).toBeGreaterThan(0);
		expect(
			cited.filter((source) => source === 'common practice, no published source').length
		).toBeGreaterThan(0);
		expect(cited).not.toContain('');
	});
});

describe('changed limits', () => {
	it('leave the set as it is when nothing is changed', () => {
		const base = limitsFor('strict');
		expect(overrideLimits(base, {})).toBe(base);
		expect(base.version).toBe('strict/2');
	});

	it('say that they are local, and what the default was', () => {
		const { version, limits } = limitsFor('guideline', { 'systolic-fall': 15 });
		expect(version).toBe('guideline/2+local');
		expect(limits['systolic-fall']).toMatchObject({
			value: 15,
			when: 'over',
			unit: 'mmHg',
			version: 'local',
			local: true
		});
		expect(limits['systolic-fall']?.source).toContain(
			'limit set locally (default 10: Inpatient stop criteria'
		);
	});

	it('keep a source and a version of their own', () => {
		const local = { value: 12, source: 'Tern Ward, agreed in March', version: '2026-03-01' };
		expect(limitsFor('strict', { 'systolic-fall': local }).limits['systolic-fall']).toMatchObject(local);
	});

	it('switch on what a set has off, with its usual crossing', () => {
		const { limits } = limitsFor('guideline', { 'systolic-rise': 40 });
		expect(limits['systolic-rise']).toMatchObject({ value: 40, when: 'over', unit: 'mmHg' });
		expect(limits['systolic-rise']?.source).toBe('limit set locally (off by default)');
	});

	it('move 80 % with the limit', () => {
		const at = (fall: number) =>
			judge({
				context: { limits: { 'systolic-fall': 15 } },
				before: { sbp: 130 },
				during: [],
				after: { sbp: 130 - fall }
			}).findings.map(({ grade, limit }) => [grade, limit]);
		expect([at(11.9), at(12), at(15), at(15.1)]).toEqual([
			[],
			[['caution', 15]],
			[['caution', 15]],
			[['stop', 15]]
		]);
	});

	it.each([
		[{ 'heart-rate-rise': 25 }, 25, 25],
		[{ 'heart-rate-rise.beta-blocked': 8 }, 20, 8],
		[{ 'heart-rate-rise': 25, 'heart-rate-rise.beta-blocked': 15 }, 25, 15]
	])('%j holds with and without a rate-slowing drug', (overrides, plain, blocked) => {
		const { limits } = limitsFor('strict', overrides);
		expect([limits['heart-rate-rise']?.value, limits['heart-rate-rise.beta-blocked']?.value]).toEqual([
			plain,
			blocked
		]);
	});

	it.each([
		[{ 'systolic-ceiling': 160 }, 160],
		[{ 'systolic-ceiling': 190 }, 180],
		[{ 'systolic-ceiling': 160, 'systolic-ceiling.before': 170 }, 160],
		[{ 'systolic-ceiling.before': 210 }, 200],
		[{ 'systolic-ceiling.before': 150 }, 150]
	])('%j: nobody starts above what would stop them', (overrides, mayStart) => {
		expect(limitsFor('strict', overrides).limits['systolic-ceiling.before']?.value).toBe(mayStart);
	});

	it('of the patient come on top of those of the unit', () => {
		const unit = limitsFor('strict', { 'systolic-fall': 15, 'systolic-rise': 35 });
		const input = session({
			context: { limits: { 'systolic-fall': 12 } },
			during: [],
			before: { sbp: 130 },
			after: { sbp: 117 }
		});
		const verdict = assess(input, unit);
		expect(only(verdict, 'systolic-fall').limit).toBe(12);
		expect(verdict).toMatchObject({ set: 'strict', version: 'strict/2+local' });
	});

	it('of the unit decide the set', () => {
		const input = session({ context: { set: 'strict' }, during: [], before: { hr: 70 }, after: { hr: 95 } });
		expect(assess(input, limitsFor('guideline'))).toMatchObject({ set: 'guideline', outcome: 'clear' });
	});
});
