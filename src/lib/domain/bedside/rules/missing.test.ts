import { describe, expect, it } from 'vitest';
import { SETS } from '../codes';
import type { Reading } from '../forms';
import { grades, judge, only, REST, type Changes } from '../testing/sample';

/*
 * What is needed before and after, that a pressure missing after walking cautions, and that what is missing is not
 * normal: common practice, no published source. That exertion is needed where the pulse says little: Rostagno, on the
 * rhythms after surgery (published as an abstract); what follows from it: common practice, no published source.
 */

const NEEDED = ['hr', 'sbp', 'dbp'] as const;
const corridor = {
	clearances: ['corridor' as const, 'out-of-bed' as const, 'stairs' as const, 'treadmill' as const]
};

describe('reading-missing', () => {
	it.each(NEEDED)('%s missing before or after is noted and makes the outcome incomplete', (field) => {
		for (const moment of ['before', 'after'] as const) {
			for (const missing of [null, undefined]) {
				const verdict = judge({ [moment]: { [field]: missing } });
				expect(grades(verdict, 'reading-missing')).toEqual([`note ${moment}`]);
				expect(verdict.outcome).toBe('incomplete');
			}
		}
	});

	it.each(['spo2', 'rr', 'pain', 'oxygenLpm'] as const)('%s is not needed', (field) => {
		const verdict = judge({ before: { [field]: null }, after: { [field]: null } });
		expect(grades(verdict, 'reading-missing')).toEqual([]);
		expect(verdict.outcome).toBe('clear');
	});

	it('names heart rate and pressure each, before and after', () => {
		const none = { hr: null, sbp: null, dbp: null };
		const verdict = judge({ before: none, after: none });
		expect(grades(verdict, 'reading-missing')).toEqual([
			'note before',
			'note before',
			'note after',
			'note after'
		]);
	});

	it.each(['bedside-walk', 'room-walk', 'hall-walk', 'hall-walk-long', 'stairs', 'treadmill-walk'] as const)(
		'pressure missing after %s cautions, and is incomplete',
		(code) => {
			const verdict = judge({
				context: corridor,
				activities: [{ code, helper: true }],
				after: { dbp: null }
			});
			expect(grades(verdict, 'reading-missing')).toEqual(['caution after']);
			expect(verdict.outcome).toBe('incomplete');
		}
	);

	it.each([
		['heart rate missing after walking', { hr: null }, {}],
		[
			'pressure missing after exercise in bed',
			{ sbp: null },
			{ activities: [{ code: 'ankle-pumps' as const }] }
		],
		[
			'pressure missing after a walk that was not done',
			{ sbp: null },
			{ activities: [{ code: 'hall-walk' as const, notDone: true }] }
		]
	])('%s stays a note', (_what, after, more) => {
		const activities = [{ code: 'hall-walk' as const }];
		expect(grades(judge({ context: corridor, activities, after, ...more }), 'reading-missing')).toEqual([
			'note after'
		]);
	});

	it('before walking stays a note', () => {
		const verdict = judge({ context: corridor, activities: [{ code: 'hall-walk' }], before: { sbp: null } });
		expect(grades(verdict, 'reading-missing')).toEqual(['note before']);
	});

	it('never hides a stop', () => {
		expect(judge({ before: { hr: null }, after: { sbp: 210 } }).outcome).toBe('stop');
	});

	it('says that missing is not normal', () => {
		expect(only(judge({ after: { hr: null } }), 'reading-missing')).toMatchObject({
			measured: null,
			limit: null,
			reason: 'The heart rate after effort was not measured. What is missing is not normal.',
			source: 'common practice, no published source'
		});
	});
});

describe('in an irregular rhythm', () => {
	const context = { rhythm: 'atrial-fibrillation' as const };

	it('exertion is needed', () => {
		const verdict = judge({ context, during: [REST] });
		expect(grades(verdict, 'reading-missing')).toEqual(['note after']);
		expect(verdict.outcome).toBe('incomplete');
	});

	it.each([
		['in effort', { during: [{ ...REST, rpe: 11 }] }],
		['after it', { during: [REST], after: { rpe: 11 } }]
	])('exertion %s is enough', (_where, changes) => {
		expect(judge({ context, ...changes }).outcome).toBe('clear');
	});

	it('is asked for as well when the rhythm came up in effort', () => {
		const verdict = judge({ during: [REST], after: { rhythm: 'paced' } });
		expect(grades(verdict, 'reading-missing')).toEqual(['note after']);
	});
});

// API.md: what is not stated (posture, source) counts as unchanged. That an unstated end is then compared with the base
// there is, rather than with nothing, is common practice, no published source: silence would hide a fall.
describe.each(SETS)('a posture that nobody stated, in the set %s', (set) => {
	const lying: Reading = { ...REST, posture: 'lying' };
	const standing: Reading = { ...REST, posture: 'standing' };
	const unstated: Reading = { ...REST, posture: undefined };

	it.each<[string, Changes]>([
		['in effort after an unsettled rise', { during: [standing, unstated], after: lying }],
		['after effort', { during: [standing], after: unstated }],
		['after a rise that has settled', { during: [{ ...standing, settled: true }], after: unstated }],
		['without a rise', { during: [lying], after: unstated }]
	])('%s is nothing missing', (_what, changes) => {
		const verdict = judge({ context: { set }, before: lying, ...changes });
		expect(grades(verdict, 'reading-missing')).toEqual([]);
		expect(verdict.outcome).toBe('clear');
	});

	it('at the end hides no fall', () => {
		const verdict = judge({
			context: { set },
			before: { ...REST, posture: 'sitting', sbp: 140 },
			during: [{ ...standing, sbp: 138 }],
			after: { ...unstated, sbp: 115 }
		});
		expect(grades(verdict, 'systolic-fall')).toEqual(['stop after']);
		expect(verdict.outcome).toBe('stop');
	});

	// clinical.md section 8, the rows of lying to standing, as a session whose end states no posture.
	it.each([
		[138, 80, 116, 72, ['caution during']],
		[128, 78, 112, 69, []],
		[130, 82, 118, 71, ['caution during']],
		[170, 90, 144, 84, ['caution during']]
	])('from %d/%d to %d/%d on rising: %j', (sbp, dbp, to, toDbp, found) => {
		const verdict = judge({
			context: { set },
			before: { ...lying, sbp, dbp },
			during: [{ ...standing, sbp: to, dbp: toDbp }],
			after: { ...unstated, sbp, dbp }
		});
		expect(grades(verdict, 'postural-fall')).toEqual(found);
		expect(verdict.outcome).toBe(found.length > 0 ? 'caution' : 'clear');
	});
});
