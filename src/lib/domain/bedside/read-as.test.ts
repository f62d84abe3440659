import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess } from './assess';
import type { RuleId } from './codes';
import { barsStart, gradeReadAs, outcomeReadAs, reasonBesideGrade, reasonReadAs } from './read-as';
import { anySession } from './testing/arbitrary';
import { judge, only, type Changes } from './testing/sample';

/** Nothing was measured after it: what is found then speaks of the patient before the start. */
const NOTHING_BEGUN: Changes = {
	during: [],
	after: { hr: null, sbp: null, dbp: null, spo2: null, rr: null, pain: null }
};

/** Every rule that can bar a start. Limits: the product's own table; which are published says the table of limits. */
const BARS: [rule: RuleId, changes: Changes][] = [
	['start-check', { context: { vasopressorRising: true } }],
	['start-check', { context: { balloonPump: true } }],
	['start-check', { context: { pacingDependent: true } }],
	['start-check', { context: { bleeding: true } }],
	['temperature-ceiling', { context: { temperature: 38.6 } }],
	['systolic-ceiling', { before: { sbp: 181 } }],
	['systolic-floor', { before: { sbp: 89 } }],
	['mean-floor', { before: { sbp: 95, dbp: 40 } }],
	['diastolic-ceiling', { before: { sbp: 150, dbp: 110 } }],
	['heart-rate-ceiling', { before: { hr: 121 } }],
	['heart-rate-floor', { before: { hr: 39 } }],
	['respiratory-ceiling', { before: { rr: 31 } }],
	['saturation-floor', { before: { spo2: 87 } }],
	['pain-ceiling', { before: { pain: 7 } }],
	['symptom', { symptoms: ['angina'] }],
	['symptom', { symptoms: [{ code: 'breathlessness', grade: 3 }] }],
	['new-rhythm', { before: { rhythm: 'atrial-fibrillation' } }],
	['arm-elevation', { activities: [{ code: 'active-arms', elevationDeg: 46 }] }],
	['clearance-missing', { activities: [{ code: 'stairs', helper: true }] }],
	['not-following', { context: { followsCommands: false }, activities: [{ code: 'ankle-pumps' }] }],
	['airway', { context: { airway: 'tube' }, activities: [{ code: 'incentive-spirometer' }] }]
];

describe.each(BARS)('%s before the start, %j', (rule, changes) => {
	const verdict = judge({ ...NOTHING_BEGUN, ...changes });
	const finding = only(verdict, rule);

	it('reads do not start, and nowhere stop', () => {
		expect(gradeReadAs(finding)).toBe('do-not-start');
		expect(finding.reason).toMatch(/^Do not start: [a-z]/);
		expect(finding.reason).not.toMatch(/\bstop/i);
		expect(outcomeReadAs(verdict.outcome, verdict.findings)).toBe('do-not-start');
	});

	it('says it once where the grade stands beside it', () => {
		expect(reasonBesideGrade(finding)).toMatch(/^[A-Z]/);
		expect(reasonBesideGrade(finding)).not.toContain('Do not start');
	});
});

describe('what was begun', () => {
	it.each([
		['in effort', { during: [{ sbp: 201, dbp: 90 }] }],
		['after it', { after: { sbp: 201 } }],
		['before it as well', { before: { sbp: 181 }, after: { sbp: 201 } }]
	] as [string, Changes][])('stops %s', (_, changes) => {
		const verdict = judge(changes);
		expect(outcomeReadAs(verdict.outcome, verdict.findings)).toBe('stop');
	});

	it.each(['caution', 'note'] as const)('a %s before it keeps its words', (grade) => {
		const finding = { grade, reading: 'before', reason: 'The pulse was not measured.' } as const;
		expect([gradeReadAs(finding), reasonReadAs(finding)]).toEqual([grade, finding.reason]);
		expect(reasonBesideGrade(finding)).toBe(finding.reason);
	});
});

it('any session: a reason says do not start when, and only when, it bars the start', () => {
	fc.assert(
		fc.property(anySession, (input) => {
			for (const finding of assess(input).findings) {
				expect(finding.reason.startsWith('Do not start: ')).toBe(barsStart(finding));
				expect(reasonReadAs(finding)).toBe(finding.reason);
			}
		})
	);
});
