/** Levels 2 and 3: the chair, the feet, the room. Figures without a published source are common practice. */
import { LEVEL_BANDS } from '../levels';
import { atLevel } from './activity';

/** Level 2: out of bed, at its side. */
export const chairActivities = atLevel(
	2,
	[LEVEL_BANDS[2].from, LEVEL_BANDS[2].to],
	[
		{
			code: 'chair-sitting',
			name: 'Sitting in the chair',
			heldBy: 'out-of-bed',
			dose: { minutes: [15, 30], timesADay: [2, 4], words: '15 to 30 minutes, 2 to 4 times a day' },
			howTo: ['A firm chair with a pillow at the back, feet flat.', 'Not leaning far back.'],
			watch: ['Pressure and colour after five minutes.', 'Drains above their bottle.'],
			never: ['Never longer than the patient can hold the head up.']
		},
		{
			code: 'sit-to-stand',
			name: 'Standing up from sitting',
			heldBy: 'out-of-bed',
			dose: { repetitions: [3, 5], timesADay: [2, 4], words: '3 to 5 times, 2 to 4 times a day' },
			howTo: [
				'Shuffle to the edge, feet down and back.',
				'Lean forward, nose over toes, and rise from the legs.',
				'Little weight on the palms, if any.'
			],
			watch: ['The first pressure after standing.', 'The pulse, felt at the wrist.'],
			never: ['Never push up through the arms.', 'Never let anybody pull at an arm.']
		},
		{
			code: 'seated-exercise',
			name: 'Exercise in the chair',
			heldBy: 'out-of-bed',
			dose: { repetitions: [5, 10], timesADay: [2, 3], words: '5 to 10 times each, 2 to 3 times a day' },
			howTo: ['Straighten the knees in turn, march on the spot, feet flat between.', 'Count aloud.'],
			watch: ['Breath enough to count.'],
			never: ['Never with the breath held.']
		},
		{
			code: 'shaving',
			name: 'Shaving with an electric razor',
			arms: true,
			dose: { timesADay: [1, 1], words: 'once a day, sitting, elbow on the table' },
			howTo: ['Elbow on the table, mirror low.', 'Rest between the sides.'],
			watch: ['The height of the arm.'],
			never: [
				'Never with a blade while blood thinners are given.',
				'Never above 45 degrees before the arms are cleared.'
			]
		},
		{
			code: 'bedside-walk',
			name: 'A few steps round the bed',
			walking: true,
			heldBy: 'out-of-bed',
			dose: {
				minutes: [1, 3],
				timesADay: [2, 3],
				words: '1 to 3 minutes, 2 to 3 times a day, with a helper'
			},
			howTo: ['Path clear, lines gathered, chair behind.', 'Stand a moment, then step.'],
			watch: ['Pressure before the first step and after the last.'],
			never: ['Never alone.', 'Never lean on a frame with the whole weight of the arms.']
		}
	]
);

/** Level 3: about the room. */
export const roomActivities = atLevel(
	3,
	[LEVEL_BANDS[3].from, LEVEL_BANDS[3].to],
	[
		{
			code: 'room-walk',
			name: 'Walking in the room',
			walking: true,
			heldBy: 'out-of-bed',
			dose: { minutes: [3, 5], timesADay: [2, 4], words: '3 to 5 minutes, 2 to 4 times a day' },
			howTo: ['To the window and the bathroom, path clear.', 'One breath in to a step, out over two.'],
			watch: ['Pulse and breathing at each turn.', 'Lines and drains on the move.'],
			never: ['Never with wet floor or loose shoes.']
		},
		{
			code: 'seated-wash',
			name: 'Washing at the basin, seated',
			heldBy: 'out-of-bed',
			dose: { minutes: [5, 15], timesADay: [1, 2], words: 'once or twice a day, on a stool' },
			howTo: ['Everything within reach of a bent elbow.', 'Help for back and feet.'],
			watch: ['Tiredness: warm water drops the pressure.'],
			never: ['Never reach behind the back or overhead.', 'Never soak the wound.']
		},
		{
			code: 'standing-warm-up',
			name: 'Warming up on the feet',
			heldBy: 'out-of-bed',
			dose: { minutes: [2, 3], timesADay: [2, 3], words: '2 to 3 minutes before each walk' },
			howTo: ['Weight from foot to foot, heels up, small knee bends.', 'A chair in front, for touch only.'],
			watch: ['Dizziness in the first minute.'],
			never: ['Never hang on the chair with the arms.']
		}
	]
);
