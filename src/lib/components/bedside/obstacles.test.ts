import { describe, expect, it } from 'vitest';
import type { SessionDraft } from './draft';
import { confirmation, obstaclesOf, pressureDoubt, pressureFault, unansweredOf } from './obstacles';
import { draft, typed } from './testing';

const idsOf = (session: ReturnType<typeof draft>) => obstaclesOf(session).map(({ id }) => id);

describe('obstaclesOf', () => {
	it('finds none in an answered session', () => {
		expect(obstaclesOf(draft())).toEqual([]);
	});

	it('asks what is open, in the order of the page', () => {
		expect(idsOf(draft({ responds: null, drug: null, rhythm: null }))).toEqual([
			'responds',
			'drug',
			'rhythm'
		]);
	});

	it.each([
		['before', { before: typed({ hr: '12o' }) }, 'before-0-hr'],
		['during', { during: [typed({}), typed({ spo2: '104' })] }, 'during-1-spo2'],
		['after', { after: typed({ sbp: '300' }) }, 'after-0-sbp'],
		['temperature', { temperature: '98' }, 'temperature'],
		[
			'dose',
			{
				activities: [
					{ code: 'hall-walk' as const, texts: { distanceM: 'far' }, confirmed: [], helper: false }
				]
			},
			'hall-walk-distanceM'
		]
	])('leads to the field that is wrong (%s)', (_, changes, id) => {
		expect(idsOf(draft(changes))).toEqual([id]);
	});

	it.each<[string, Partial<SessionDraft>]>([
		['a reading', { before: typed({ hr: '80' }) }],
		['what was done', { activities: [{ code: 'self-feeding', texts: {}, confirmed: [], helper: false }] }],
		['what was felt', { symptoms: ['dizziness'] }],
		['the temperature', { temperature: '37.2' }]
	])('lets nothing at all be recorded, and %s alone', (_, something) => {
		const nothing = { before: typed({}), during: [], after: typed({}), activities: [], symptoms: [] };
		expect(idsOf(draft({ ...nothing, temperature: ' ' }))).toEqual(['activities']);
		expect(idsOf(draft({ ...nothing, temperature: '', ...something }))).toEqual([]);
	});

	it('names moment, field, value and bounds', () => {
		const [obstacle] = obstaclesOf(draft({ after: typed({ hr: '300' }) }));
		expect(obstacle?.words).toBe('After, Pulse: 300 is not possible here: 20 to 250 beats/min.');
	});

	it('asks about a doubtful value until just that value is confirmed', () => {
		const asked = typed({ hr: '160' });
		expect(idsOf(draft({ after: asked }))).toEqual(['after-0-hr']);
		const confirmed = typed({ hr: '160' }, { confirmed: [confirmation('hr', ' 160 ')] });
		expect(idsOf(draft({ after: confirmed }))).toEqual([]);
		expect(idsOf(draft({ after: { ...confirmed, texts: { hr: '161' } } }))).toEqual(['after-0-hr']);
	});

	it('does not take an activity that asks for no dose to lack one', () => {
		const feeding = { code: 'self-feeding' as const, texts: {}, confirmed: [], helper: false };
		expect(obstaclesOf(draft({ activities: [feeding] }))).toEqual([]);
	});
});

// The range of the pulse pressure, 10 to 150 mmHg: common practice, no published source.
describe('two pressures', () => {
	it.each([
		['74', '128', 'Systolic 74 is not above diastolic 128'],
		['120', '120', 'Systolic 120 is not above diastolic 120'],
		['121', '120', null]
	])('%s over %s', (sbp, dbp, words) => {
		const fault = pressureFault(typed({ sbp, dbp }));
		expect(fault === null ? null : fault.slice(0, words?.length)).toBe(words);
	});

	it.each([
		['109', '100', true],
		['110', '100', false],
		['200', '50', false],
		['200', '49', true],
		['100', '110', false],
		['100', '', false]
	])('asks about %s over %s: %s', (sbp, dbp, asks) => {
		expect(pressureDoubt(typed({ sbp, dbp })) !== null).toBe(asks);
	});

	it('takes a confirmed pair and asks about another', () => {
		const confirmed = [confirmation('pressures', '109/100')];
		expect(pressureDoubt(typed({ sbp: '109', dbp: '100' }, { confirmed }))).toBeNull();
		expect(pressureDoubt(typed({ sbp: '108', dbp: '100' }, { confirmed }))).not.toBeNull();
	});
});

describe('unansweredOf', () => {
	const spirometer = { code: 'incentive-spirometer' as const, texts: {}, confirmed: [], helper: false };

	it.each([
		['nobody looked', {}, 1],
		['somebody looked and found none', { noStartChecks: true }, 0],
		['somebody found one', { startChecks: ['bleeding' as const] }, 0],
		['the spirometer without an answer on the tube', { noStartChecks: true, activities: [spirometer] }, 1],
		['the spirometer with one', { noStartChecks: true, activities: [spirometer], airway: 'none' as const }, 0]
	])('%s', (_, changes, count) => {
		expect(unansweredOf(draft(changes))).toHaveLength(count);
	});
});
