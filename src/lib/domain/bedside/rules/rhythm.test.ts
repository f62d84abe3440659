import { describe, expect, it } from 'vitest';
import { RHYTHMS } from '../../core/codes';
import { grades, judge, only, REST } from '../testing/sample';

// A new rhythm stops: inpatient line of the ACSM and AACVPR, from study notes, secondary.
describe('new-rhythm', () => {
	it.each(RHYTHMS)('%s throughout is nothing new', (rhythm) => {
		expect(grades(judge({ context: { rhythm } }), 'new-rhythm')).toEqual([]);
	});

	it.each(RHYTHMS.flatMap((from) => RHYTHMS.filter((to) => to !== from).map((to) => [from, to] as const)))(
		'from %s to %s stops',
		(from, to) => {
			const after = judge({ context: { rhythm: from }, after: { rhythm: to } });
			const during = judge({
				context: { rhythm: from },
				during: [{ ...REST, rhythm: to }],
				after: { rhythm: from }
			});
			expect(grades(after, 'new-rhythm')).toEqual(['stop after']);
			expect(grades(during, 'new-rhythm')).toEqual(['stop during']);
		}
	);

	it('that is already there before a start bars the start, and is not new again later', () => {
		const verdict = judge({ before: { rhythm: 'atrial-fibrillation' } });
		expect(grades(verdict, 'new-rhythm')).toEqual(['stop before']);
		expect(only(verdict, 'new-rhythm').reason).toBe(
			'Do not start: the rhythm before the session is atrial fibrillation; it was sinus rhythm.'
		);
	});

	it('holds until a reading says otherwise', () => {
		const during = [{ ...REST, rhythm: 'paced' as const }, REST];
		expect(grades(judge({ during }), 'new-rhythm')).toEqual(['stop during', 'stop after']);
	});
});

describe('rhythm-caveat', () => {
	it('is silent in sinus rhythm', () => {
		expect(grades(judge(), 'rhythm-caveat')).toEqual([]);
	});

	it.each(['atrial-fibrillation', 'paced', 'other'] as const)(
		'notes why in %s, and leaves a clear session clear',
		(rhythm) => {
			const verdict = judge({ context: { rhythm } });
			expect(grades(verdict, 'rhythm-caveat')).toEqual(['note during']);
			expect(only(verdict, 'rhythm-caveat').measured).toBe(rhythm);
			expect(verdict.outcome).toBe('clear');
		}
	);

	it('notes it too when the rhythm came up in effort', () => {
		expect(grades(judge({ after: { rhythm: 'other' } }), 'rhythm-caveat')).toEqual(['note during']);
	});
});
