import { describe, expect, it } from 'vitest';
import { RISK_MARKS } from '$lib/domain/calculators';
import { CALCULATORS } from '$lib/domain/calculators/rulebook';
import { CALCULATOR_SPECS } from './all';
import { spirometerSpec } from './breathing';
import { riskSpec } from './outpatient';
import { heartFailureSpec, inpatientCeilingSpec } from './rates';
import { orthostaticSpec } from './rising';
import { doubtOf, type CalculatorSpec, type Typed } from './spec';

/** The answer in large, and the notes below it. */
function answer(spec: CalculatorSpec, typed: Typed): string[] {
	const worked = spec.work(typed);
	return worked.kind === 'result' ? [worked.result.head, ...worked.result.notes] : [worked.kind];
}

const NO_MARKS = Object.fromEntries(RISK_MARKS.map((mark) => [mark, 'no']));
const rising = (criterion: string, from: string, to: string): Typed => {
	const [beforeSbp = '', beforeDbp = ''] = from.split('/');
	const [afterSbp = '', afterDbp = ''] = to.split('/');
	return { criterion, beforeSbp, beforeDbp, afterSbp, afterDbp };
};

describe('on the page', () => {
	it.each([
		// Keteyian 2012 (published), computed.
		[heartFailureSpec, { age: '65', resting: '70', mode: 'treadmill' }, 'Maximum 122 /min, predicted'],
		[heartFailureSpec, { age: '65', resting: '70', mode: 'cycle' }, 'Maximum 117 /min, predicted'],
		// The inpatient line as given in study notes (secondary), computed.
		[inpatientCeilingSpec, { resting: '84', cap: '130' }, '114 /min at most'],
		[inpatientCeilingSpec, { resting: '104', cap: '130' }, '130 /min at most'],
		[inpatientCeilingSpec, { resting: '104', cap: '120' }, '120 /min at most'],
		// Consensus of 2011, as summarised (published), computed; from sitting, Shaw 2017 (published).
		[orthostaticSpec, rising('lying-to-standing', '138/80', '116/72'), 'Orthostatic hypotension'],
		[
			orthostaticSpec,
			rising('high-lying-to-standing', '170/90', '144/84'),
			'No orthostatic hypotension by this measure'
		],
		[orthostaticSpec, rising('sitting-to-standing', '126/76', '111/70'), 'Orthostatic hypotension'],
		// Published instructions (600, 1200 mL/s) and a leaflet (900, secondary), computed.
		[spirometerSpec, { balls: '1', seconds: '3' }, 'About 1800 mL, estimated'],
		[spirometerSpec, { balls: '2', seconds: '3' }, 'About 2700 mL, estimated'],
		[spirometerSpec, { balls: '3', seconds: '2' }, 'About 2400 mL, estimated'],
		// PMC8006124, table 3 (published), computed.
		[riskSpec, { ...NO_MARKS, ejectionFraction: '55', mets: '8' }, 'Low risk'],
		[riskSpec, { ...NO_MARKS, ejectionFraction: '45', mets: '6' }, 'Moderate risk'],
		[riskSpec, { ...NO_MARKS, ejectionFraction: '60', mets: '9', depression: 'yes' }, 'High risk']
	] as [CalculatorSpec, Typed, string][])('$id gives %j', (spec, typed, head) => {
		expect(answer(spec, typed)[0]).toBe(head);
	});

	it('says when the cap holds, when to rest, and that a capacity is small', () => {
		expect(answer(inpatientCeilingSpec, { resting: '104', cap: '130' })).toContain(
			'The cap holds, not the rise of 30.'
		);
		const breath = { balls: '1', seconds: '3', vitalCapacityMl: '780', weightKg: '80' };
		// 20 breaths in an hour and 10 mL per kg: from memory, not yet verified.
		expect(answer(spirometerSpec, { ...breath, breaths: '21' })).toHaveLength(3);
		expect(answer(spirometerSpec, { ...breath, breaths: '20', vitalCapacityMl: '800' })).toHaveLength(1);
	});

	it('a class needs an answer to every mark, and is not low without measurements', () => {
		expect(riskSpec.work({ ...NO_MARKS, depression: '' })).toEqual({ kind: 'open', lacking: ['depression'] });
		expect(answer(riskSpec, NO_MARKS)).toEqual([
			'Moderate risk',
			'Ejection fraction or capacity was not measured, so that it cannot be low.'
		]);
	});
});

it('every calculator that the rules list is on the page, and the other way round', () => {
	const listed = [...new Set(CALCULATORS.map(({ page }) => page))];
	expect(listed.toSorted()).toEqual(CALCULATOR_SPECS.map(({ id }) => id).toSorted());
});

it.each([
	['weightKg', '39', 'Really 39? Usual is 40 to 180 kg: a range from memory, to be confirmed locally.'],
	['weightKg', '40', null],
	['weightKg', 'x', null],
	['weightKg', '', null]
])('%s of %j is asked about: %s', (name, text, words) => {
	expect(doubtOf(name, text)).toBe(words);
});
