import { describe, expect, it } from 'vitest';
import { assess } from './assess';
import { adviseLevel, afterDecision, type Suggestion } from './progress';
import { seniorSignsLevel } from './sign-off';
import { REST, session, type Changes } from './testing/sample';
import { LEVELS, type Level } from '../core/codes';

/** The catalogue has its first walk, round the bed, at the level after this one. */
const BEFORE_WALKING = 1;

const NOTHING = { hr: null, sbp: null, dbp: null, spo2: null, rr: null, pain: null };

function advice(level: Level, changes: Changes = {}) {
	const input = session(changes);
	return adviseLevel(level, input, assess(input));
}

describe('adviseLevel', () => {
	it.each<[string, Changes, Suggestion, Level]>([
		['a session with nothing to say', {}, 'progress', 4],
		['a caution', { after: { spo2: 89 } }, 'stay', 3],
		['a needed reading missing', { after: { hr: null } }, 'stay', 3],
		['a stop before the start', { before: { sbp: 84, dbp: 50 }, during: [], after: NOTHING }, 'stay', 3],
		['a stop in effort', { during: [{ ...REST, sbp: 210 }] }, 'step-back', 2],
		['a symptom that stops', { symptoms: ['dizziness'] }, 'step-back', 2],
		['a note', { context: { betaBlocked: null }, during: [] }, 'progress', 4]
	])('%s', (_what, changes, suggestion, to) => {
		expect(advice(3, changes)).toMatchObject({ suggestion, to });
	});

	it.each<[string, Level, boolean, Suggestion]>([
		['a session of the level', 3, false, 'progress'],
		['a session of a harder level', 4, false, 'progress'],
		['a session of an easier level', 2, false, 'stay'],
		['a session before somebody decided on the level', 3, true, 'stay']
	])('by %s', (_what, sessionLevel, decidedSince, suggestion) => {
		const input = session({});
		expect(adviseLevel(3, input, assess(input), undefined, { sessionLevel, decidedSince }).suggestion).toBe(
			suggestion
		);
	});

	it('of an easier level still speaks for going back', () => {
		const input = session({ symptoms: ['dizziness'] });
		const basis = { sessionLevel: 2, decidedSince: true } as const;
		expect(adviseLevel(3, input, assess(input), undefined, basis)).toMatchObject({
			suggestion: 'step-back',
			to: 2
		});
	});

	it('holds where nothing was compared with rest in the same posture', () => {
		const standing = { posture: 'standing' } as const;
		const changes = { before: { posture: 'lying' } as const, during: [], after: standing };
		const { suggestion, reasons } = advice(3, changes);
		expect(suggestion).toBe('stay');
		expect(reasons.filter(({ weight }) => weight === 'for').map(({ words }) => words)).toEqual([]);
	});

	it('does not climb over level 6 or fall under level 1', () => {
		expect(advice(6)).toMatchObject({ suggestion: 'progress', to: 6, needs: [] });
		expect(advice(1, { symptoms: ['angina'] })).toMatchObject({ suggestion: 'step-back', to: 1 });
	});

	// Chest pain and rhythm over 8 hours: study notes of the inpatient line (secondary); the rest from memory.
	it('asks what daily walking needs before the first level with walking, and at no other', () => {
		const asked = LEVELS.map(
			(level) => advice(level).reasons.filter(({ words }) => words.startsWith('Before daily walking')).length
		);
		expect(asked).toEqual(LEVELS.map((level) => (level === BEFORE_WALKING ? 3 : 0)));
	});

	it.each([
		[{ chestPain: true, heartFailureSigns: false, newRhythm: false }, 'stay'],
		[{ chestPain: false, heartFailureSigns: false, newRhythm: true }, 'stay'],
		[{ chestPain: null, heartFailureSigns: null, newRhythm: null }, 'progress'],
		[{ chestPain: false, heartFailureSigns: false, newRhythm: false }, 'progress']
	] as const)('before it %j speaks for: %s', (checks, suggestion) => {
		const input = session();
		expect(adviseLevel(BEFORE_WALKING, input, assess(input), checks).suggestion).toBe(suggestion);
	});

	// 10 to 40 mmHg above rest: AACVPR line, from memory.
	it.each([
		[9, 'consider'],
		[10, 'for'],
		[40, 'for'],
		[40.1, 'against']
	])('a systolic rise of %d weighs %s', (rise, weight) => {
		const during = [{ ...REST, sbp: 120 + rise, rpe: 11 }];
		const { reasons } = advice(3, { context: { set: 'guideline' }, during, after: { sbp: 120 } });
		expect(reasons.find(({ words }) => words.startsWith('The systolic pressure rose'))?.weight).toBe(weight);
	});

	it.each([0, -4])('says of a systolic rise of %d that it did not rise', (rise) => {
		const reading = { ...REST, sbp: 120 + rise, rpe: 11 };
		const { reasons } = advice(3, {
			context: { set: 'guideline' },
			during: [reading],
			after: { sbp: 120 + rise }
		});
		expect(reasons.map(({ words }) => words).join()).toContain(
			'The systolic pressure did not rise; 10 to 40'
		);
	});

	it('says nothing about a pressure that was not measured', () => {
		const { reasons } = advice(3, { before: { sbp: null } });
		expect(reasons.filter(({ words }) => words.startsWith('The systolic pressure rose'))).toEqual([]);
	});

	it.each<[Level, Changes, string[]]>([
		[3, {}, []],
		[3, { context: { clearances: [{ kind: 'corridor', state: 'on-hold' }] } }, ['corridor']],
		[4, {}, ['arm-stage']],
		[4, { context: { clearances: ['arm-stage'] } }, []],
		[4, { context: { sternotomy: false } }, []],
		[5, {}, ['stairs']]
	])('from level %d names what the next level lacks', (level, changes, needs) => {
		expect(advice(level, changes).needs).toEqual(needs);
	});

	it('repeats the sentences of the findings, and lists what was not judged', () => {
		const { reasons } = advice(3, { context: { temperature: undefined }, after: { spo2: 89 } });
		expect(reasons.map(({ weight, words }) => `${weight}: ${words}`)).toEqual(
			expect.arrayContaining([
				'against: The oxygen saturation after effort is 89 %, under the limit of 90.',
				'consider: Rules that could not be judged, for want of a reading, a posture or an answer: 1.'
			])
		);
	});
});

describe('afterDecision', () => {
	it.each<[Level, Level, Level, Level]>([
		[3, 3, 4, 4],
		[4, 3, 2, 4],
		[4, 2, 3, 4],
		[4, 2, 6, 6]
	])('reached %d, today %d, decided %d: reached is %d', (reached, today, to, then) => {
		expect(afterDecision({ reached, today }, to)).toEqual({ reached: then, today: to });
	});
});

describe('seniorSignsLevel', () => {
	it.each<[Level, Level, Changes, boolean]>([
		[3, 4, {}, false],
		[3, 5, {}, true],
		[3, 4, { after: { spo2: 89 } }, true],
		[3, 3, { symptoms: ['angina'] }, false],
		[3, 2, {}, false]
	])('from %d to %d: %s', (from, to, changes, expected) => {
		expect(seniorSignsLevel(from, to, advice(from, changes))).toBe(expected);
	});
});
