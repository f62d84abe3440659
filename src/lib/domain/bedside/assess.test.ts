import { describe, expect, it } from 'vitest';
import { RULE_IDS } from './codes';
import type { Reading } from './forms';
import { RULES } from './rules/registry';
import { judge, REST, type Changes } from './testing/sample';

describe('the registry', () => {
	it('has one row for each rule', () => {
		expect(RULES.map(({ id }) => id).sort()).toEqual([...RULE_IDS].sort());
	});

	it.each(RULES.map((rule) => [rule.id, rule] as const))('%s is put into words', (_id, { words }) => {
		expect(words).toMatch(/^[A-Z].*\.$/s);
	});
});

/** The stops of a session measured once in effort, by rule, without the pressures and postures of the sample. */
function stops(
	set: 'strict' | 'guideline',
	betaBlocked: boolean,
	before: Reading,
	during: Reading
): string[] {
	const { findings } = judge({
		context: { set, betaBlocked },
		before,
		during: [{ ...before, ...during }],
		after: before
	});
	return findings.filter(({ grade }) => grade === 'stop').map(({ rule }) => rule);
}

/**
 * Check values computed from two inpatient lines: `guideline` from the ACSM and AACVPR inpatient criteria as
 * given in study notes, `strict` from O'Sullivan, Schmitz and Fulk, Physical Rehabilitation (from memory). Where
 * they differ from the product's own table, the table wins and the row says so.
 */
describe('check values of the inpatient rules', () => {
	const rest = (hr: number, sbp: number, dbp: number): Reading => ({ ...REST, hr, sbp, dbp });
	const effort = (hr: number, sbp: number, dbp: number, rpe?: number): Reading => ({ hr, sbp, dbp, rpe });

	it.each<[string, Reading, Reading, boolean, string[], string[]]>([
		['+18, +14', rest(78, 118, 72), effort(96, 132, 74, 11), false, [], []],
		[
			'the same on a rate-slowing drug',
			rest(78, 118, 72),
			effort(96, 132, 74, 11),
			true,
			[],
			['heart-rate-rise']
		],
		[
			'+24, -14',
			rest(84, 124, 70),
			effort(108, 110, 66),
			false,
			['systolic-fall'],
			['systolic-fall', 'heart-rate-rise']
		],
		['+32, +28', rest(90, 130, 78), effort(122, 158, 80), false, ['heart-rate-rise'], ['heart-rate-rise']],
		['+12, +32 on a rate-slowing drug', rest(70, 120, 70), effort(82, 152, 72), true, [], ['systolic-rise']],
		['+16, -10', rest(88, 126, 74), effort(104, 116, 72), false, [], []],
		// The textbook line has no diastolic rule; ours judges it in every set.
		[
			'diastolic 110',
			rest(76, 130, 84),
			effort(94, 150, 110),
			false,
			['diastolic-ceiling'],
			['diastolic-ceiling']
		],
		// The textbook line has no ceiling of the rate; ours has it in every set.
		[
			'to 131',
			rest(102, 128, 80),
			effort(131, 140, 82),
			false,
			['heart-rate-ceiling'],
			['heart-rate-ceiling', 'heart-rate-rise']
		],
		// An exertion of 14 is a flag in the guideline line; in ours it cautions.
		['exertion 14', rest(80, 122, 76), effort(100, 134, 78, 14), false, [], []]
	])('%s', (_what, before, during, betaBlocked, guideline, strict) => {
		expect(stops('guideline', betaBlocked, before, during)).toEqual(guideline);
		expect(stops('strict', betaBlocked, before, during)).toEqual(strict);
	});

	it('exertion 14 cautions in both', () => {
		for (const set of ['strict', 'guideline'] as const) {
			const during = [{ ...REST, rpe: 14 }];
			expect(
				judge({ context: { set }, during }).findings.map(({ rule, grade }) => `${rule} ${grade}`)
			).toEqual(['exertion-ceiling caution']);
		}
	});

	// A fall of 4 points counts, under 88 % is desaturation: AARC exercise oximetry protocol.
	it.each<[number, number, string[]]>([
		[96, 91, ['caution saturation-fall']],
		[92, 87, ['stop saturation-floor', 'caution saturation-fall']]
	])('saturation from %d to %d', (from, to, expected) => {
		const { findings } = judge({
			before: { spo2: from },
			during: [{ ...REST, spo2: to }],
			after: { spo2: from }
		});
		expect(findings.map(({ grade, rule }) => `${grade} ${rule}`)).toEqual(expected);
	});
});

describe('the outcome', () => {
	const caution: Changes = { after: { spo2: 89 }, before: { spo2: 92 } };
	const missing: Changes = { after: { hr: null } };

	it.each<[string, Changes, string]>([
		['nothing to say', {}, 'clear'],
		['a note', { context: { betaBlocked: null }, during: [] }, 'clear'],
		['a caution', caution, 'caution'],
		['a needed reading missing', missing, 'incomplete'],
		['missing and a caution', { after: { hr: null, spo2: 89 }, before: { spo2: 92 } }, 'incomplete'],
		['missing and a stop', { ...missing, symptoms: ['angina'] }, 'stop'],
		['a caution and a stop', { ...caution, symptoms: ['angina'] }, 'stop']
	])('with %s is as it should be', (_what, changes, expected) => {
		expect(judge(changes).outcome).toBe(expected);
	});

	it('puts the gravest finding first', () => {
		const { findings } = judge({
			context: { rhythm: 'paced', temperature: 38.2 },
			before: { sbp: 84, dbp: 50 },
			symptoms: ['nausea', 'angina']
		});
		const order = findings.map(({ grade }) => ['stop', 'caution', 'note'].indexOf(grade));
		expect(order).toEqual([...order].sort());
		expect(new Set(order).size).toBe(3);
	});
});

it('does not change what it is given, and answers the same twice', () => {
	const changes: Changes = { symptoms: ['nausea'], context: { limits: { 'systolic-fall': 5 } } };
	expect(judge(Object.freeze(changes))).toEqual(judge(changes));
});
