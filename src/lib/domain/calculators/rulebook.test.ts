import { expect, it } from 'vitest';
import { SOURCE_STATUSES } from '../bedside/limits/sources';
import { CALCULATORS } from './rulebook';

it.each(CALCULATORS.map((entry) => [entry.name, entry] as const))(
	'%s says what it rests on',
	(_name, entry) => {
		expect(SOURCE_STATUSES).toContain(entry.status);
		expect([entry.formula, entry.range, entry.source]).not.toContain('');
		expect(entry.address ?? 'https://').toMatch(/^https:\/\//);
	}
);

it('names each calculator once', () => {
	expect(new Set(CALCULATORS.map(({ name }) => name)).size).toBe(CALCULATORS.length);
});
