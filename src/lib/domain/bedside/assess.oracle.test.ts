import fc from 'fast-check';
import { expect, it } from 'vitest';
import { assess } from './assess';
import { OUTCOMES, SETS } from './codes';
import type { Verdict } from './finding';
import type { Assessment } from './forms';
import { limitsOfPatient } from './limits/layers';
import { anyLayers, anyLimits, anySession, calmSession } from './testing/arbitrary';
import { workedOut } from './testing/oracle';

const SESSIONS = 10_000;
const TIME_LIMIT_MS = 120_000;

/** Rule, grade and moment of each finding, and the outcome: what both ways of working out must agree on. */
function agrees({ findings, outcome }: Verdict, expected: ReturnType<typeof workedOut>): void {
	const found = new Set(findings.map(({ rule, grade, reading }) => `${rule} ${grade} ${reading}`));
	expect([...found].sort().join('\n')).toBe([...expected.found].sort().join('\n'));
	expect(outcome).toBe(expected.outcome);
}

/** Agreement means little when every random session ends the same way. */
function meetsEveryOutcome(outcomes: ReadonlySet<string>): void {
	expect([...outcomes].sort()).toEqual([...OUTCOMES].sort());
}

const session = fc.oneof(anySession, calmSession);

it(
	`agrees with the rules worked out a second way on ${SESSIONS} random sessions`,
	() => {
		const outcomes = new Set<string>();
		fc.assert(
			fc.property(session, (input) => {
				const verdict = assess(input);
				agrees(verdict, workedOut(input));
				outcomes.add(verdict.outcome);
			}),
			{ numRuns: SESSIONS }
		);
		meetsEveryOutcome(outcomes);
	},
	TIME_LIMIT_MS
);

it(
	`agrees on ${SESSIONS} more under random limits of unit, patient, body and prescribed range`,
	() => {
		const outcomes = new Set<string>();
		let moved = 0;
		fc.assert(
			fc.property(
				session,
				anyLayers,
				fc.option(anyLimits),
				fc.constantFrom(...SETS),
				(given, laid, limits, set) => {
					// Limits in the body come from a program that knows no record, so that no range on record stands beside them.
					const layers = limits === null ? laid : { ...laid, prescribed: null };
					const input: Assessment = { ...given, context: { ...given.context, limits } };
					const verdict = assess(input, limitsOfPatient(set, layers));
					agrees(verdict, workedOut(input, layers, set));
					outcomes.add(verdict.outcome);
					moved += verdict.findings.some(({ version }) => /unit|patient|local|prescribed/.test(version ?? ''))
						? 1
						: 0;
				}
			),
			{ numRuns: SESSIONS }
		);
		meetsEveryOutcome(outcomes);
		// In a good part of them a limit that was moved is what found something.
		expect(moved).toBeGreaterThan(SESSIONS / 20);
	},
	TIME_LIMIT_MS
);
