import { describe, expect, it } from 'vitest';
import { activityByCode } from './activities/activities';
import { doseNotes, seniorSignsDose } from './doses';

describe('doseNotes', () => {
	// Walking 5 to 7 minutes at level 4: common practice, no published source.
	it.each([
		[undefined, []],
		[null, []],
		[4, []],
		[5, []],
		[5.1, ['senior']],
		[7, ['senior']],
		[7.1, ['unusual']]
	])('%s minutes in the corridor', (minutes, kinds) => {
		const notes = doseNotes({ minutes }, activityByCode('hall-walk'));
		expect(notes.map(({ kind }) => kind)).toEqual(kinds);
		expect(seniorSignsDose({ minutes }, activityByCode('hall-walk'))).toBe(kinds.length > 0);
	});

	it('looks at repetitions too, and at nothing that is not dosed that way', () => {
		expect(doseNotes({ repetitions: 25, minutes: 90 }, activityByCode('ankle-pumps'))).toEqual([
			{
				field: 'repetitions',
				given: 25,
				cautious: 15,
				usual: [15, 20],
				kind: 'unusual',
				words: 'Ankle pumps: 25 repetitions is more than the usual 15 to 20.'
			}
		]);
	});

	it('knows a dose that is one figure', () => {
		expect(doseNotes({ repetitions: 6 }, activityByCode('leg-slides'))[0]?.words).toBe(
			'Leg slides: 6 repetitions is more than the usual 5.'
		);
	});
});
