import fc from 'fast-check';
import { expect, it } from 'vitest';
import { assess } from './assess';
import { OUTCOMES } from './codes';
import { anySession, calmSession } from './testing/arbitrary';
import { workedOut } from './testing/oracle';

const SESSIONS = 10_000;
const TIME_LIMIT_MS = 120_000;

it(
	`agrees with the rules worked out a second way on ${SESSIONS} random sessions`,
	() => {
		const outcomes = new Map<string, number>();
		fc.assert(
			fc.property(fc.oneof(anySession, calmSession), (input) => {
				const { findings, outcome } = assess(input);
				const expected = workedOut(input);
				const found = new Set(findings.map(({ rule, grade, reading }) => `${rule} ${grade} ${reading}`));
				expect([...found].sort().join('\n')).toBe([...expected.found].sort().join('\n'));
				expect(outcome).toBe(expected.outcome);
				outcomes.set(outcome, (outcomes.get(outcome) ?? 0) + 1);
			}),
			{ numRuns: SESSIONS }
		);
		// Agreement means little when every random session ends the same way.
		expect([...outcomes.keys()].sort()).toEqual([...OUTCOMES].sort());
	},
	TIME_LIMIT_MS
);
