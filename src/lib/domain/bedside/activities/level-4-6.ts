/** Levels 4 to 6: the corridor, the arms, the stairs; and the gym. Figures without a published source are common practice. */
import { LEVEL_BANDS } from '../levels';
import { atLevel } from './activity';

/** Level 4: short walks in the corridor. */
export const corridorActivities = atLevel(
	4,
	[LEVEL_BANDS[4].from, LEVEL_BANDS[4].to],
	[
		{
			code: 'hall-walk',
			name: 'Walking in the corridor',
			walking: true,
			heldBy: 'corridor',
			dose: {
				minutes: [5, 7],
				timesADay: [3, 4],
				words: '5 to 7 minutes, 3 to 4 times a day, on a corridor of 50 m'
			},
			howTo: ['Count the laps, there and back.', 'A pace at which one can talk.', 'Chairs along the way.'],
			watch: ['Pressure before and right after.', 'Pulse at the wrist at each turn.'],
			never: ['Never go on through chest pain or dizziness.']
		},
		{
			code: 'standing-exercise',
			name: 'Exercise on the feet',
			heldBy: 'out-of-bed',
			dose: { repetitions: [5, 10], timesADay: [2, 3], words: '5 to 10 times each, 2 to 3 times a day' },
			howTo: ['Heels up, knees up in turn, leg to the side.', 'A rail at hand for balance.'],
			watch: ['Breath enough to talk.'],
			never: ['Never with weights or bands for the arms.']
		}
	]
);

/** Level 5: longer walks, and the arms once they are cleared. */
export const longerActivities = atLevel(
	5,
	[LEVEL_BANDS[5].from, LEVEL_BANDS[5].to],
	[
		{
			code: 'hall-walk-long',
			name: 'Longer walks in the corridor',
			walking: true,
			heldBy: 'corridor',
			dose: { minutes: [8, 10], timesADay: [3, 4], words: '8 to 10 minutes, 3 to 4 times a day' },
			howTo: ['The same pace, longer; rest before it is needed.', 'Count the laps.'],
			watch: ['Pressure before and right after.', 'The effort the patient feels.'],
			never: ['Never faster before longer.']
		},
		{
			code: 'arm-exercise',
			name: 'Arm exercise',
			arms: true,
			clearance: 'arm-stage',
			needs: ['Level 5'],
			dose: {
				repetitions: [5, 10],
				timesADay: [1, 2],
				words: '5 to 10 times, to 90 degrees or the limit of the clearance'
			},
			howTo: ['Both arms together, slowly, unloaded.', 'Thumbs up, breathe out on the way up.'],
			watch: ['The breastbone: no click, no gap, no pain.', 'The wound afterwards.'],
			never: ['Never one arm alone.', 'Never behind the back.', 'Never with a weight that was not agreed.']
		}
	]
);

/** Level 6: one flight of stairs. */
export const stairActivities = atLevel(
	6,
	[LEVEL_BANDS[6].from, LEVEL_BANDS[6].to],
	[
		{
			code: 'stairs',
			name: 'One flight of stairs',
			walking: true,
			stairs: true,
			clearance: 'stairs',
			needs: ['A helper'],
			dose: {
				repetitions: [1, 1],
				timesADay: [1, 2],
				words: 'one flight, one step at a time, with a helper'
			},
			howTo: [
				'Good leg up first; both feet on each step.',
				'The helper one step below.',
				'A hand on the rail, not pulling.'
			],
			watch: ['At each step: pulse, breathing rate, face.', 'A chair at the top.'],
			never: ['Never without a helper.', 'Never talk and climb at once.']
		}
	]
);

/** The supervised gym, after discharge. Their energy demand follows the prescription. */
export const gymActivities = atLevel(
	6,
	[2, 8],
	[
		{
			code: 'treadmill-walk',
			name: 'Walking on the treadmill',
			phase: 'outpatient',
			walking: true,
			clearance: 'treadmill',
			dose: {
				minutes: [20, 45],
				words: '20 to 45 minutes with 5 to 10 to warm up and to cool down, 3 days a week'
			},
			howTo: ['Start slow and level; longer before faster.', 'Hands resting, not holding on.'],
			watch: ['Rate and effort against the prescribed range.', 'Pressure at each stage.'],
			never: ['Never step off a moving belt.', 'Never skip the cool-down.']
		},
		{
			code: 'leg-cycle',
			name: 'Cycling',
			phase: 'outpatient',
			dose: {
				minutes: [15, 30],
				words: '15 to 30 minutes with 5 to warm up and to cool down, 3 days a week'
			},
			howTo: ['Saddle so that the knee stays a little bent.', 'Steady turns, hands loose.'],
			watch: ['Rate and effort against the prescribed range.'],
			never: ['Never lean on straight arms before the breastbone has healed.']
		}
	]
);
