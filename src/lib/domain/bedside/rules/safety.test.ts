import { describe, expect, it } from 'vitest';
import { ACTIVITIES } from '../activities/activities';
import type { ActivityDone, Context } from '../forms';
import { grades, judge, only } from '../testing/sample';

/*
 * The passive set, the cough of the awake, the spirometer once the tube is out, stairs with a helper: common practice,
 * no published source. That a rate-slowing drug blunts the pulse: Keteyian 2023 (published); that 'not known' is judged
 * as taken: common practice, no published source.
 */

const done = (code: ActivityDone['code'], more: Partial<ActivityDone> = {}): ActivityDone[] => [
	{ code, ...more }
];
const PASSIVE = ['passive-legs', 'passive-arms'];

describe('not-following', () => {
	it.each(ACTIVITIES.map(({ code }) => code))('%s: the passive set only', (code) => {
		const expected = PASSIVE.includes(code) ? [] : ['stop during'];
		const cases: Partial<Context>[] = [
			{ followsCommands: false },
			{ conscious: false, followsCommands: undefined }
		];
		for (const context of cases) {
			expect(grades(judge({ context, activities: done(code) }), 'not-following')).toEqual(expected);
		}
		expect(grades(judge({ activities: done(code) }), 'not-following')).toEqual([]);
	});

	it('is unjudged for active work when nobody said whether a conscious patient follows', () => {
		const context = { followsCommands: null };
		expect(judge({ context, activities: done('ankle-pumps') }).notJudged).toContain('not-following');
		expect(judge({ context, activities: done('passive-legs') }).notJudged).not.toContain('not-following');
		expect(judge({ activities: done('ankle-pumps') }).notJudged).not.toContain('not-following');
	});
});

describe('airway', () => {
	it.each<[string, ActivityDone['code'], Partial<Context>, string[]]>([
		['cough, awake', 'splinted-cough', {}, []],
		['cough, not conscious', 'splinted-cough', { conscious: false }, ['stop during']],
		['cough, not following', 'splinted-cough', { followsCommands: false }, ['stop during']],
		['spirometer, tube out', 'incentive-spirometer', {}, []],
		['spirometer, tube in', 'incentive-spirometer', { airway: 'tube' }, ['stop during']],
		['spirometer, tracheostomy', 'incentive-spirometer', { airway: 'tracheostomy' }, ['stop during']],
		['breathing, tube in', 'deep-breathing', { airway: 'tube' }, []]
	])('%s', (_what, code, context, found) => {
		expect(grades(judge({ context, activities: done(code) }), 'airway')).toEqual(found);
	});

	it('bars the cough of a confused patient', () => {
		const verdict = judge({ activities: done('splinted-cough'), symptoms: ['confusion'] });
		expect(grades(verdict, 'airway')).toEqual(['stop during']);
	});

	it('is unjudged for the spirometer when the airway is not stated', () => {
		const context = { airway: undefined };
		expect(judge({ context, activities: done('incentive-spirometer') }).notJudged).toContain('airway');
		expect(judge({ context, activities: done('splinted-cough') }).notJudged).not.toContain('airway');
	});
});

describe('helper-missing', () => {
	const context: Partial<Context> = { clearances: ['stairs', 'corridor'] };

	it.each<[string, Partial<ActivityDone>, string[]]>([
		['nothing stated', {}, ['caution during']],
		['alone', { assistance: 'alone' }, ['caution during']],
		['a helper denied', { helper: false }, ['caution during']],
		['a helper without a name', { helper: '' }, ['caution during']],
		['one helper', { assistance: 'one' }, []],
		['two helpers', { assistance: 'two' }, []],
		['a helper who is there', { helper: true }, []],
		['a helper by name', { helper: 'Daughter' }, []]
	])('stairs, %s', (_what, more, found) => {
		const verdict = judge({ context, activities: done('stairs', more) });
		expect(grades(verdict, 'helper-missing')).toEqual(found);
		expect(verdict.outcome).toBe(found.length === 0 ? 'clear' : 'caution');
	});

	it('is about stairs alone', () => {
		expect(judge({ context, activities: done('hall-walk') }).findings).toEqual([]);
	});
});

describe('beta-blocker-unknown', () => {
	it.each([
		[true, []],
		[false, []],
		[null, ['note during']]
	])('%s', (betaBlocked, found) => {
		const verdict = judge({ context: { betaBlocked }, during: [], after: { hr: 80 } });
		expect(grades(verdict, 'beta-blocker-unknown')).toEqual(found);
		expect(verdict.outcome).toBe('clear');
	});

	it('says what follows from it', () => {
		const verdict = judge({ context: { betaBlocked: null }, during: [], after: { hr: 80 } });
		expect(only(verdict, 'beta-blocker-unknown').reason).toContain('judged as if so');
	});
});
