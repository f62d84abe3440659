import { expect, it } from 'vitest';
import { RISK_MARKS, riskClass, type RiskMark } from './risk';

/** Computed from PMC8006124, table 3, published; 5 to 7 METs are moderate by exclusion. */
it.each<[number | null, number | null, RiskMark[], string]>([
	[55, 8, [], 'low'],
	[45, 6, [], 'moderate'],
	[55, 6, [], 'moderate'],
	[38, 8, [], 'high'],
	[60, 9, ['depression'], 'high'],
	[50, 7, [], 'low'],
	[49.9, 7, [], 'moderate'],
	[50, 6.9, [], 'moderate'],
	[40, 7, [], 'moderate'],
	[39.9, 7, [], 'high'],
	// What was not measured is never good.
	[null, 9, [], 'moderate'],
	[60, null, [], 'moderate']
])('EF %s, %s METs, %j: %s', (ejectionFraction, mets, marks, expected) => {
	expect(riskClass(ejectionFraction, mets, marks)).toBe(expected);
});

it.each(RISK_MARKS)('%s alone is high, however good the rest', (mark) => {
	expect(riskClass(65, 12, [mark])).toBe('high');
});
