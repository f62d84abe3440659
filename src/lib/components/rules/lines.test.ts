import { describe, expect, it } from 'vitest';
import { LIMIT_KEYS, SETS } from '$lib/domain/bedside/codes';
import { limitsFor } from '$lib/domain/bedside/limits/limits';
import { rulebook } from '$lib/domain/bedside/rulebook';
import { limitLines } from './lines';

const { rows } = rulebook();
const linesOf = (rule: string) => limitLines(rows.find((row) => row.rule === rule)?.limits ?? []);

describe('limitLines', () => {
	// The limits are those of the table of response rules in the description of the JSON API.
	it.each([
		['systolic-ceiling', 0, 'Stop, mmHg', 'over 200 | over 200 | over 250'],
		['systolic-ceiling', 1, 'Stop before a start, mmHg', 'over 180 | over 180 | over 180'],
		['diastolic-ceiling', 0, 'Stop, mmHg', 'at 110 | at 110 | over 115'],
		['heart-rate-floor', 0, 'Stop, beats/min', 'under 40 | under 40 | under 40'],
		['systolic-rise', 0, 'Stop, mmHg', 'over 30 | off | off'],
		['heart-rate-rise', 1, 'Stop, with a rate-slowing drug, beats/min', 'over 12 | over 30 | off'],
		['saturation-fall', 0, 'Caution, %', 'at 4 | at 4 | at 4'],
		['temperature-ceiling', 0, 'Stop, °C', 'over 38.5 | over 38.5 | over 38.5']
	])('%s, line %d: %s %s', (rule, index, label, values) => {
		const line = linesOf(rule)[index];
		expect(line?.label).toBe(label);
		expect(SETS.map((set) => line?.values[set]).join(' | ')).toBe(values);
	});

	// The four words are those of the list that the document and the page share.
	it.each([
		['systolic-floor', 'published'],
		['heart-rate-rise', 'secondary'],
		['systolic-rise', 'from memory']
	])('%s says beside its source that it is %s', (rule, status) => {
		expect(linesOf(rule)[0]?.sources.join()).toMatch(new RegExp(` · ${status}(,|$)`));
	});

	it('says of a figure nobody published that it is common practice', () => {
		expect(linesOf('respiratory-ceiling')[0]?.sources).toEqual(['common practice, no published source']);
	});

	it('says which set a source is for only where they differ', () => {
		const [fall] = linesOf('systolic-fall');
		expect(fall?.sources.map((source) => source.split(':')[0])).toEqual([
			'Strict',
			'Guideline',
			'Outpatient'
		]);
		expect(linesOf('systolic-floor')[0]?.sources).toHaveLength(1);
		expect(linesOf('systolic-floor')[0]?.sources[0]).not.toMatch(/^Strict/);
	});

	it.each([
		['systolic-ceiling', 0, ['version 2'], []],
		['systolic-ceiling', 2, ['version 2'], ['Our own figure']],
		['heart-rate-fall', 0, ['version 2'], ['Our own figure']],
		['systolic-fall', 0, ['version 2'], []]
	])('%s, line %d: %j, %j', (rule, index, versions, own) => {
		expect(linesOf(rule)[index]).toMatchObject({ versions, own });
	});

	it('names the sets in which the unit has a figure of its own, with its version', () => {
		const local = { 'systolic-fall': { value: 15, source: 'set by the unit', version: 'unit 3' } };
		const unit = rulebook({ strict: limitsFor('strict', local) });
		const [fall] = limitLines(unit.rows.find(({ rule }) => rule === 'systolic-fall')?.limits ?? []);
		expect(fall?.versions).toEqual(['Strict: version unit 3', 'Guideline, Outpatient: version 2']);
		expect(fall?.own).toEqual(['Strict: The unit’s own figure']);
	});

	it('has a word for the meaning of every limit', () => {
		const lines = rows.flatMap(({ limits }) => limitLines(limits));
		expect(lines.map(({ key }) => key).sort()).toEqual([...LIMIT_KEYS].sort());
		for (const { label } of lines) {
			expect(label).toMatch(/^(Stop|Caution)/);
		}
	});

	it('has nothing to say of a rule without numbers', () => {
		expect(linesOf('new-rhythm')).toEqual([]);
	});
});
