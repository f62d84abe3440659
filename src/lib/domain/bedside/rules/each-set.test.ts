/**
 * Every rule that no set changes, in each set all the same: just under, at and just over its limit, with the value
 * missing, and with postures mixed; in the two rules on rising work the sets differ in their caution alone. The limits on which the sets differ stand in `absolute`, `change` and `stage`.
 * Limits: the product's own table; which of them have a published source says the table of limits.
 */
import { describe, expect, it } from 'vitest';
import type { ActivityCode } from '../activities/codes';
import { SETS, type RuleId, type SetName } from '../codes';
import type { Reading } from '../forms';
import { grades, judge, REST, type Changes } from '../testing/sample';

type Found = string[] | ((set: SetName) => string[]);
type Case = [rule: RuleId, what: string, changes: Changes, found: Found];

const lying = { ...REST, posture: 'lying', sbp: 150, dbp: 90 } as const;
/** Lying before, then up: the first reading on the feet falls by so much. */
const upTo = (systolic: number | null, diastolic: number | null, more: Changes = {}): Changes => {
	const up = {
		...REST,
		posture: 'standing' as const,
		sbp: systolic === null ? null : 150 - systolic,
		dbp: diastolic === null ? null : 90 - diastolic
	};
	return { before: lying, during: [up], after: { ...up, settled: true }, ...more };
};
const lift = (elevationDeg: number | null, cleared: boolean): Changes => ({
	context: { clearances: cleared ? ['arm-stage'] : [] },
	activities: [{ code: 'active-arms', elevationDeg }]
});
const breathless = (grade: number | null): Changes => ({ symptoms: [{ code: 'breathlessness', grade }] });
/** One value after effort against the one before, nothing between. */
const saturation = (before: number | null, after: number | null): Changes => ({
	before: { spo2: before },
	during: [],
	after: { spo2: after }
});

const UNBEGUN: Changes = {
	during: [],
	after: { hr: null, sbp: null, dbp: null, spo2: null, rr: null, pain: null }
};
const doing = (code: ActivityCode, context: Changes['context'] = {}): Changes => ({
	context,
	activities: [{ code }]
});
const rising = (one: Reading, other: Reading): Changes => ({
	during: [
		{ ...REST, ...one, work: 1 },
		{ ...REST, ...other, work: 2 }
	]
});
/** From 80 % of a limit the strict set cautions; the others wait for the limit. */
const strictly =
	(found: string) =>
	(set: SetName): string[] =>
		set === 'strict' ? [found] : [];

const CASES: Case[] = [
	['postural-fall', 'systolic 19.9', upTo(19.9, 0), []],
	['postural-fall', 'systolic 20', upTo(20, 0), ['caution during']],
	['postural-fall', 'systolic 20.1', upTo(20.1, 0), ['caution during']],
	['postural-fall', 'diastolic 9.9', upTo(0, 9.9), []],
	['postural-fall', 'diastolic 10', upTo(0, 10), ['caution during']],
	['postural-fall', 'diastolic 10.1', upTo(0, 10.1), ['caution during']],
	['postural-fall', 'systolic 30', upTo(30, 0), ['caution during']],
	['postural-fall', 'systolic 30.1', upTo(30.1, 0), ['stop during']],
	['postural-fall', 'systolic 20 with a symptom', upTo(20, 0, { symptoms: ['nausea'] }), ['stop during']],
	['postural-fall', 'systolic missing, diastolic 10', upTo(null, 10), ['caution during']],
	['postural-fall', 'both missing', upTo(null, null), []],
	['postural-fall', 'the same posture', { ...upTo(25, 0), before: { ...lying, posture: 'standing' } }, []],
	['arm-elevation', '45 before the clearance', lift(45, false), []],
	['arm-elevation', '45.1 before the clearance', lift(45.1, false), ['stop during']],
	['arm-elevation', '90 after it', lift(90, true), []],
	['arm-elevation', '90.1 after it', lift(90.1, true), ['stop during']],
	['arm-elevation', 'height missing', lift(null, false), []],
	['symptom', 'breathless, grade 2', breathless(2), ['caution during']],
	['symptom', 'breathless, grade 2.9', breathless(2.9), ['caution during']],
	['symptom', 'breathless, grade 3', breathless(3), ['stop during']],
	['symptom', 'breathless, grade 3.1', breathless(3.1), ['stop during']],
	['symptom', 'breathless, not graded', breathless(null), ['caution during']],
	['temperature-ceiling', '37.9', { context: { temperature: 37.9 } }, []],
	['temperature-ceiling', '38', { context: { temperature: 38 } }, []],
	['temperature-ceiling', '38.1', { context: { temperature: 38.1 } }, ['caution before']],
	['temperature-ceiling', '38.5', { context: { temperature: 38.5 } }, ['caution before']],
	['temperature-ceiling', '38.6', { context: { temperature: 38.6 } }, ['stop before']],
	['temperature-ceiling', 'missing', { context: { temperature: null } }, []],
	['saturation-fall', '3.9', saturation(99, 95.1), []],
	['saturation-fall', '4', saturation(99, 95), ['caution after']],
	['saturation-fall', '4.1', saturation(99, 94.9), ['caution after']],
	['saturation-fall', 'missing before', saturation(null, 90), []],
	['saturation-fall', 'missing after', saturation(99, null), []],
	['mean-floor', '60', { after: { ...REST, sbp: 100, dbp: 40 } }, []],
	['mean-floor', '59.97', { after: { ...REST, sbp: 99.9, dbp: 40 } }, ['stop after']],
	['mean-floor', 'diastolic missing', { after: { ...REST, sbp: 95, dbp: null } }, []],
	['start-check', 'none', {}, []],
	['start-check', 'bleeding', { context: { bleeding: true } }, ['stop before']],
	['new-rhythm', 'the same', { after: { rhythm: 'sinus' } }, []],
	['new-rhythm', 'another', { after: { rhythm: 'atrial-fibrillation' } }, ['stop after']],
	['reading-missing', 'pulse after', { after: { hr: null } }, ['note after']],
	[
		'reading-missing',
		'pressure after walking',
		{ after: { sbp: null, dbp: null }, activities: [{ code: 'room-walk' }] },
		['caution after']
	],
	['clearance-missing', 'stairs', { activities: [{ code: 'stairs', helper: true }] }, ['stop during']],
	[
		'not-following',
		'active work',
		{ context: { followsCommands: false }, activities: [{ code: 'ankle-pumps' }] },
		['stop during']
	],
	// Common practice, no published source: a cough of the awake, a spirometer once the tube is out.
	['airway', 'cough, awake', doing('splinted-cough'), []],
	['airway', 'cough, not following', doing('splinted-cough', { followsCommands: false }), ['stop during']],
	['airway', 'cough, confused', { ...doing('splinted-cough'), symptoms: ['confusion'] }, ['stop during']],
	['airway', 'spirometer, tube out', doing('incentive-spirometer'), []],
	['airway', 'spirometer, tube in', doing('incentive-spirometer', { airway: 'tube' }), ['stop during']],
	[
		'airway',
		'spirometer, tracheostomy',
		doing('incentive-spirometer', { airway: 'tracheostomy' }),
		['stop during']
	],
	['airway', 'spirometer, airway missing', doing('incentive-spirometer', { airway: null }), []],
	// That a pulse says little in these rhythms: Rostagno, published as an abstract.
	['rhythm-caveat', 'sinus', {}, []],
	['rhythm-caveat', 'fibrillation', { context: { rhythm: 'atrial-fibrillation' } }, ['note during']],
	['rhythm-caveat', 'paced', { context: { rhythm: 'paced' } }, ['note during']],
	['rhythm-caveat', 'another', { context: { rhythm: 'other' } }, ['note during']],
	['rhythm-caveat', 'only after effort', { after: { rhythm: 'paced' } }, ['note during']],
	['rhythm-caveat', 'nothing begun', { ...UNBEGUN, context: { rhythm: 'paced' } }, ['note before']],
	// Judged as if taken: common practice; that such a drug blunts the rate: Keteyian 2023, published.
	['beta-blocker-unknown', 'taken', { context: { betaBlocked: true } }, []],
	['beta-blocker-unknown', 'not taken', { context: { betaBlocked: false } }, []],
	['beta-blocker-unknown', 'not known', { context: { betaBlocked: null } }, ['note during']],
	[
		'beta-blocker-unknown',
		'not known, nothing begun',
		{ ...UNBEGUN, context: { betaBlocked: null } },
		['note before']
	],
	// Between two readings of rising work. Systolic: American Family Physician 2017, published; pulse: common practice.
	['systolic-stage-fall', '10', rising({ sbp: 150 }, { sbp: 140 }), strictly('caution during')],
	['systolic-stage-fall', '10.1', rising({ sbp: 150 }, { sbp: 139.9 }), ['stop during']],
	['systolic-stage-fall', 'missing', rising({ sbp: 150 }, { sbp: null }), []],
	['systolic-stage-fall', 'mixed postures', rising({ sbp: 150 }, { sbp: 120, posture: 'standing' }), []],
	['heart-rate-fall', '10', rising({ hr: 100 }, { hr: 90 }), strictly('caution during')],
	['heart-rate-fall', '10.1', rising({ hr: 100 }, { hr: 89.9 }), ['stop during']],
	['heart-rate-fall', 'missing', rising({ hr: 100 }, { hr: null }), []],
	['heart-rate-fall', 'mixed postures', rising({ hr: 100 }, { hr: 80, posture: 'standing' }), []],
	[
		'helper-missing',
		'stairs alone',
		{ context: { clearances: ['stairs'] }, activities: [{ code: 'stairs' }] },
		['caution during']
	]
];

describe.each(SETS)('in the set %s', (set) => {
	it.each(CASES)('%s: %s', (rule, _what, changes, found) => {
		const verdict = judge({ ...changes, context: { set, ...changes.context } });
		expect(grades(verdict, rule)).toEqual(typeof found === 'function' ? found(set) : found);
	});

	it.each([
		['no pulse before', { before: { hr: null } }],
		['no pulse after', { after: { hr: null } }],
		['no systolic pressure before', { before: { sbp: null } }],
		['no diastolic pressure after', { after: { dbp: null } }]
	] as [string, Changes][])('%s is incomplete, never clear', (_, changes) => {
		expect(judge({ ...changes, context: { set } }).outcome).toBe('incomplete');
	});

	it('compares no pressures of two postures, and says that it could not', () => {
		const verdict = judge({
			context: { set },
			before: { posture: 'sitting', sbp: 130 },
			during: [],
			after: { posture: 'standing', sbp: 112 }
		});
		expect(grades(verdict, 'systolic-fall')).toEqual([]);
		expect(verdict.notJudged).toContain('systolic-fall');
	});

	// Common practice, no published source.
	it('does not start at 84/50', () => {
		const verdict = judge({ context: { set }, before: { sbp: 84, dbp: 50 }, during: [], after: {} });
		expect(grades(verdict, 'systolic-floor')).toEqual(['stop before']);
		expect(verdict.outcome).toBe('stop');
	});
});

// Common practice, no published source: a fall of 10 cautions, 11 stops; a rise of 30 cautions, 31 stops.
it.each([
	['systolic-fall', 120, 110, ['caution after']],
	['systolic-fall', 120, 109, ['stop after']],
	['systolic-rise', 110, 140, ['caution after']],
	['systolic-rise', 110, 141, ['stop after']]
] as const)('%s from %d to %d', (rule, from, to, found) => {
	const verdict = judge({ before: { sbp: from }, during: [], after: { sbp: to } });
	expect(grades(verdict, rule)).toEqual(found);
});
