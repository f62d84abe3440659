/** Which reading a change is counted from. Same posture, same source, settled: common practice, no published source. */
import { describe, expect, it } from 'vitest';
import type { Reading } from '../forms';
import { grades, judge, only, REST } from '../testing/sample';

describe('the base', () => {
	const lying: Reading = { ...REST, posture: 'lying', sbp: 130, hr: 70 };
	const standing: Reading = { ...REST, posture: 'standing', sbp: 118, hr: 80 };
	const falls = (before: Reading, during: Reading[], after: Reading = { sbp: null, dbp: null }) =>
		grades(judge({ before, during, after: { ...after, posture: after.posture } }), 'systolic-fall');

	it.each<[string, Reading, Reading[], string[]]>([
		['the same posture is compared', lying, [{ ...lying, sbp: 119 }], ['stop during']],
		['another posture is not', lying, [standing], []],
		[
			'a settled reading starts a new base',
			lying,
			[
				{ ...standing, settled: true },
				{ ...standing, sbp: 107 }
			],
			['stop during']
		],
		['a settled reading is the base, not the fall', lying, [{ ...standing, settled: true }], []],
		['an unsettled reading is no base', lying, [standing, { ...standing, sbp: 100 }], []],
		[
			'settled without moving is no new base',
			lying,
			[
				{ ...lying, sbp: 121, settled: true },
				{ ...lying, sbp: 119 }
			],
			['stop during']
		],
		[
			'back in the first posture the first base holds',
			lying,
			[
				{ ...standing, settled: true },
				{ ...lying, sbp: 119 }
			],
			['stop during']
		],
		[
			'a second rest does not move the base',
			lying,
			[
				{ ...standing, settled: true },
				{ ...standing, sbp: 110, settled: true },
				{ ...standing, sbp: 107 }
			],
			['stop during']
		],
		[
			'a posture not stated is the one before',
			lying,
			[{ ...REST, posture: undefined, sbp: 119 }],
			['stop during']
		],
		[
			'no posture anywhere counts as unchanged',
			{ ...lying, posture: undefined },
			[{ ...REST, posture: undefined, sbp: 119 }],
			['stop during']
		],
		[
			'a posture stated late counts for the start',
			{ ...standing, posture: undefined },
			[{ ...standing, sbp: 107 }],
			['stop during']
		],
		[
			'unstated after an unsettled rise is still judged',
			lying,
			[standing, { ...REST, posture: undefined, sbp: 105 }],
			['stop during']
		]
	])('%s', (_what, before, during, found) => {
		expect(falls(before, during)).toEqual(found);
	});

	it.each<[string, Reading, Reading, string[]]>([
		['cuff against cuff', { bpSource: 'cuff' }, { bpSource: 'cuff' }, ['stop after']],
		['cuff against line', { bpSource: 'cuff' }, { bpSource: 'arterial' }, []],
		['line against cuff', { bpSource: 'arterial' }, { bpSource: 'cuff' }, []],
		['not stated at the end', { bpSource: 'arterial' }, { bpSource: undefined }, ['stop after']],
		['not stated at the start', { bpSource: undefined }, { bpSource: 'arterial' }, ['stop after']]
	])('compares pressures of one source: %s', (_what, before, after, found) => {
		const verdict = judge({ before: { sbp: 130, ...before }, during: [], after: { sbp: 115, ...after } });
		expect(grades(verdict, 'systolic-fall')).toEqual(found);
		expect(verdict.notJudged.includes('systolic-fall')).toBe(found.length === 0);
	});

	it('is not made by settling in the same posture, so a change of source stays unjudged', () => {
		const during: Reading[] = [
			{ ...REST, sbp: 128, bpSource: 'arterial', settled: true },
			{ ...REST, sbp: 110, bpSource: 'arterial' }
		];
		const verdict = judge({
			before: { sbp: 130, bpSource: 'cuff' },
			during,
			after: { sbp: 128, bpSource: 'cuff' }
		});
		expect(grades(verdict, 'systolic-fall')).toEqual([]);
		expect(verdict.notJudged).toContain('systolic-fall');
	});

	it('lets heart rate and saturation be compared across sources of pressure', () => {
		const verdict = judge({
			before: { hr: 70, spo2: 98, bpSource: 'arterial' },
			during: [],
			after: { hr: 95, spo2: 93, bpSource: 'cuff' }
		});
		expect(grades(verdict, 'heart-rate-rise')).toEqual(['stop after']);
		expect(grades(verdict, 'saturation-fall')).toEqual(['caution after']);
	});

	it('is named in the sentence', () => {
		const verdict = judge({
			before: lying,
			during: [
				{ ...standing, settled: true },
				{ ...standing, sbp: 104 }
			],
			after: { ...standing, sbp: 116 }
		});
		expect(only(verdict, 'systolic-fall').reason).toBe(
			'The systolic pressure fell by 14 mmHg, from 118 at rest standing to 104 in effort: more than the limit of 10.'
		);
	});
});

describe('what cannot be compared', () => {
	it.each<[string, Parameters<typeof judge>[0]]>([
		['no value before', { before: { sbp: null } }],
		['no value after', { after: { sbp: null } }],
		['another posture at the end', { after: { posture: 'standing' } }],
		['another source in effort', { during: [{ ...REST, bpSource: 'arterial' }] }],
		['nothing at all after', { during: [], after: { hr: null, sbp: null, dbp: null } }]
	])('%s leaves systolic-fall unjudged', (_what, changes) => {
		expect(judge(changes).notJudged).toContain('systolic-fall');
	});

	it('is nothing in a complete session', () => {
		expect(judge().notJudged).toEqual([]);
	});
});
