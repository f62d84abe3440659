import { describe, expect, it } from 'vitest';
import type { Reading } from '../forms';
import { grades, judge, only } from '../testing/sample';

// 20 and 10 mmHg: consensus on orthostatic hypotension 2011, as summarised, published. 30 mmHg stops: common practice.
const lying = (sbp: number, dbp: number, more: Reading = {}): Reading => ({
	posture: 'lying',
	sbp,
	dbp,
	...more
});
const standing = (sbp: number | null, dbp: number | null, more: Reading = {}): Reading => ({
	posture: 'standing',
	sbp,
	dbp,
	...more
});

/** Lying before, the given readings in effort, and an end in the posture of the last of them. */
function rising(before: Reading, during: Reading[], symptoms: Parameters<typeof judge>[0] = {}) {
	return judge({ before, during, after: { posture: during.at(-1)?.posture }, ...symptoms });
}

describe('postural-fall', () => {
	// 20 systolic or 10 diastolic: consensus on orthostatic hypotension 2011, as summarised; rows computed from it.
	it.each<[number, number, number, number, string[], number | null]>([
		[138, 80, 116, 72, ['caution during'], 20],
		[128, 78, 112, 69, [], null],
		[130, 82, 118, 71, ['caution during'], 10],
		[170, 90, 144, 84, ['caution during'], 20],
		[126, 76, 111, 70, [], null],
		// Exactly at a limit counts.
		[130, 80, 110, 75, ['caution during'], 20],
		[130, 80, 110.1, 75, [], null],
		[130, 80, 125, 70, ['caution during'], 10],
		[130, 80, 125, 70.1, [], null],
		// Over 30 systolic stops without a symptom; 30 does not.
		[150, 80, 120, 78, ['caution during'], 20],
		[150, 80, 119.9, 78, ['stop during'], 30]
	])('from %d/%d to %d/%d', (sbp, dbp, toSbp, toDbp, found, limit) => {
		const verdict = rising(lying(sbp, dbp), [standing(toSbp, toDbp)]);
		expect(grades(verdict, 'postural-fall')).toEqual(found);
		expect(limit === null ? null : only(verdict, 'postural-fall').limit).toBe(limit);
	});

	it.each([
		[110, 75],
		[125, 70]
	])('stops at %d/%d when there is any symptom', (sbp, dbp) => {
		const verdict = rising(lying(130, 80), [standing(sbp, dbp)], { symptoms: ['nausea'] });
		expect(grades(verdict, 'postural-fall')).toEqual(['stop during']);
		expect(only(verdict, 'postural-fall').reason).toContain('and there is a symptom');
	});

	it('does not make a fall out of a symptom', () => {
		const verdict = rising(lying(130, 80), [standing(115, 75)], { symptoms: ['dizziness'] });
		expect(grades(verdict, 'postural-fall')).toEqual([]);
	});

	it.each<[string, Reading, Reading[], string[]]>([
		['sitting up', lying(130, 80), [{ posture: 'sitting', sbp: 108, dbp: 76 }], ['caution during']],
		[
			'from sitting to standing',
			{ posture: 'sitting', sbp: 130, dbp: 80 },
			[standing(108, 76)],
			['caution during']
		],
		['lying down again', standing(130, 80), [lying(100, 60)], []],
		['only the first pressure after rising', lying(130, 80), [standing(128, 80), standing(105, 60)], []],
		[
			'a pulse first, then the pressure',
			lying(130, 80),
			[standing(null, null, { hr: 90 }), standing(105, 78)],
			['caution during']
		],
		[
			'the last pressure before rising',
			lying(130, 80),
			[lying(150, 80), standing(128, 80)],
			['caution during']
		],
		[
			'another source',
			lying(130, 80, { bpSource: 'cuff' }),
			[standing(100, 60, { bpSource: 'arterial' })],
			[]
		],
		['a settled reading too', lying(130, 80), [standing(105, 78, { settled: true })], ['caution during']],
		['no posture stated', { posture: undefined, sbp: 130, dbp: 80 }, [{ sbp: 100, dbp: 60 }], []],
		[
			'two rises in a row',
			lying(130, 80),
			[{ posture: 'sitting', sbp: 108, dbp: 76 }, standing(85, 60)],
			['caution during', 'caution during']
		]
	])('%s', (_what, before, during, found) => {
		expect(grades(rising(before, during), 'postural-fall')).toEqual(found);
	});

	it('is found in the reading after effort as well', () => {
		const verdict = judge({ before: lying(130, 80), during: [], after: standing(95, 60) });
		expect(grades(verdict, 'postural-fall')).toEqual(['stop after']);
	});

	it.each<[string, Reading, Reading[], boolean]>([
		['nobody rose', lying(130, 80), [lying(128, 80)], false],
		['the pressure after rising is missing', lying(130, 80), [standing(null, null)], true],
		['one of the two is missing', lying(130, 80), [standing(128, null)], true],
		[
			'the pressure before rising is missing',
			{ posture: 'lying', sbp: null, dbp: null },
			[standing(128, 80)],
			true
		],
		[
			'the source changed',
			lying(130, 80, { bpSource: 'cuff' }),
			[standing(128, 80, { bpSource: 'arterial' })],
			true
		],
		['both are there', lying(130, 80), [standing(128, 80)], false]
	])('when %s, unjudged is %4$s', (_what, before, during, unjudged) => {
		const verdict = judge({
			before,
			during,
			after: { posture: during.at(-1)?.posture, sbp: null, dbp: null }
		});
		expect(verdict.notJudged.includes('postural-fall')).toBe(unjudged);
	});

	it('says from where to where', () => {
		expect(only(rising(lying(138, 80), [standing(116, 72)]), 'postural-fall').reason).toBe(
			'On standing up the systolic pressure fell by 22 mmHg, from 138 to 116: which reaches the limit of 20.'
		);
	});
});
