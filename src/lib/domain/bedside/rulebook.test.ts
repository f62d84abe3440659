import { describe, expect, it } from 'vitest';
import { LIMIT_KEYS, RULE_IDS } from './codes';
import { limitsFor } from './limits/limits';
import { rulebook } from './rulebook';

describe('the rulebook', () => {
	const { rows, version } = rulebook();

	it('lists every rule once and every limit in every set once', () => {
		expect(rows.map(({ rule }) => rule).sort()).toEqual([...RULE_IDS].sort());
		const limits = rows.flatMap((row) => row.limits.map(({ key, set }) => `${key} ${set}`));
		expect(new Set(limits).size).toBe(limits.length);
		expect(limits).toHaveLength(LIMIT_KEYS.length * 3);
		expect(version).toBe('strict/2, guideline/2, outpatient/2');
	});

	it.each(rows.map((row) => [row.rule, row] as const))(
		'%s has a source with a status',
		(_rule, { sources }) => {
			expect(sources.length).toBeGreaterThan(0);
			expect(new Set(sources.map(({ id }) => id)).size).toBe(sources.length);
		}
	);

	it('shows what a set has switched off', () => {
		const rise = rows.find(({ rule }) => rule === 'systolic-rise');
		expect(rise?.limits.map(({ set, value }) => [set, value])).toEqual([
			['strict', 30],
			['guideline', null],
			['outpatient', null]
		]);
	});

	it('shows the limits of a unit, marked', () => {
		const unit = rulebook({ strict: limitsFor('strict', { 'systolic-fall': 15 }) });
		const fall = unit.rows.find(({ rule }) => rule === 'systolic-fall')?.limits[0];
		expect(fall).toMatchObject({ value: 15, when: 'over', unit: 'mmHg', local: true });
		expect(unit.version).toContain('strict/2+local');
	});
});
