/** Level 1: in bed and on its edge. Figures without a published source are common practice. */
import { LEVEL_BANDS } from '../levels';
import { atLevel } from './activity';

const { from, to } = LEVEL_BANDS[1];

/** Limbs moved in bed, by others or by the patient. */
export const limbActivities = atLevel(
	1,
	[from, to],
	[
		{
			code: 'passive-legs',
			name: 'Legs moved for the patient',
			mode: 'passive',
			dose: {
				repetitions: [5, 10],
				timesADay: [2, 3],
				words: '5 to 10 times at each joint, 2 to 3 times a day'
			},
			howTo: ['Support the leg above and below the joint.', 'Move slowly through the range that is free.'],
			watch: ['Lines in the groin.', 'Monitor and face while moving.'],
			never: ['Never bend a hip that holds a line or a balloon pump.']
		},
		{
			code: 'passive-arms',
			name: 'Arms moved for the patient',
			mode: 'passive',
			arms: true,
			dose: {
				repetitions: [5, 10],
				timesADay: [2, 3],
				words: '5 to 10 times at each joint, 2 to 3 times a day'
			},
			howTo: [
				'Hold arm and wrist, both supported.',
				'Stay at or below 45 degrees until the arms are cleared.'
			],
			watch: ['The breastbone under the other hand: no click, no gap.', 'Lines at neck and wrist.'],
			never: ['Never pull on the arm, and never lift it by the hand alone.']
		},
		{
			code: 'ankle-pumps',
			name: 'Ankle pumps',
			dose: {
				repetitions: [15, 20],
				timesADay: [4, 8],
				words: '15 to 20 times, every hour or two while awake'
			},
			howTo: ['Pull the toes up, then push them down, as far as they go.'],
			watch: ['A calf that is hot, swollen or sore.'],
			never: ['Never hold the breath with it.']
		},
		{
			code: 'leg-slides',
			name: 'Leg slides',
			needs: ['Day 1 or 2', 'The patient follows commands'],
			dose: { repetitions: [5, 5], timesADay: [2, 3], words: '5 times each leg, from day 1 or 2' },
			howTo: ['Slide the heel towards the seat and back, the foot on the sheet.', 'One leg at a time.'],
			watch: ['Pulse and face while sliding.', 'Leg wounds where a vein was taken.'],
			never: ['Never both legs at once.']
		},
		{
			code: 'active-legs',
			name: 'Legs moved by the patient',
			dose: { repetitions: [5, 10], timesADay: [2, 3], words: '5 to 10 times each, 2 to 3 times a day' },
			howTo: ['Tighten the thigh, straighten the knee, let go.', 'Breathe out with the effort.'],
			watch: ['Pulse and breathing between the sets.'],
			never: ['Never with the breath held.']
		},
		{
			code: 'active-arms',
			name: 'Small arm movements',
			arms: true,
			dose: {
				repetitions: [5, 10],
				timesADay: [2, 3],
				words: '5 to 10 times, at most 45 degrees before the clearance'
			},
			howTo: ['Both arms together, elbows near the trunk.', 'Small and unloaded.'],
			watch: ['Pulling at the wound.', 'The breastbone: no click.'],
			never: ['Never above 45 degrees before the arms are cleared.', 'Never with a weight.']
		}
	]
);

/** Breathing and coughing. */
export const breathingActivities = atLevel(
	1,
	[from, to],
	[
		{
			code: 'deep-breathing',
			name: 'Deep breathing',
			dose: { repetitions: [5, 10], timesADay: [8, 12], words: '5 to 10 breaths an hour while awake' },
			howTo: ['Breathe in slowly and deep, hold 1 to 2 seconds.', 'Let the air go by itself.'],
			watch: ['Light-headedness: rest and breathe normally.'],
			never: ['Never force the air out.']
		},
		{
			code: 'diaphragmatic-breathing',
			name: 'Breathing into the belly',
			dose: { repetitions: [5, 10], timesADay: [4, 8], words: '5 to 10 breaths, several times a day' },
			howTo: ['A hand on the belly: it rises as the air comes in.', 'Hold 1 to 2 seconds, let go.'],
			watch: ['Shoulders that rise instead.'],
			never: ['Never hurry the breaths.']
		},
		{
			code: 'splinted-cough',
			name: 'Huff and cough with a splint',
			needs: ['Awake and oriented'],
			dose: {
				repetitions: [2, 3],
				timesADay: [4, 8],
				words: '2 or 3 huffs, then a cough, from day 0 once awake'
			},
			howTo: [
				'Press a pillow or crossed arms to the breastbone.',
				'Huff with an open throat, then cough once.',
				'Splint for sneezing and laughing as well.'
			],
			watch: ['Colour and amount of what comes up.', 'Pain that stops the cough: ask for relief first.'],
			never: ['Never cough without the splint.']
		},
		{
			code: 'incentive-spirometer',
			name: 'Three-ball spirometer',
			needs: ['The tube is out'],
			source: 'spirometer-dose',
			dose: {
				repetitions: [10, 10],
				timesADay: [8, 12],
				words: '10 breaths an hour while awake; note the balls'
			},
			howTo: [
				'Lips tight, breathe in slowly and long so that the ball stays up.',
				'Take it out of the mouth to breathe out.',
				'The goal by discharge is one and a half to two balls.'
			],
			watch: ['Dizziness or tingling: too many breaths.', 'Low and long is better than all balls at once.'],
			never: ['Never more than 20 breaths in an hour.', 'Never blow into it.']
		}
	]
);

/** Turning, sitting on the edge, and the first things one does for oneself. */
export const bedActivities = atLevel(
	1,
	[from, to],
	[
		{
			code: 'bed-mobility',
			name: 'Turning and moving in bed',
			dose: { repetitions: [1, 3], timesADay: [2, 4], words: 'with each change of position' },
			howTo: [
				'Knees bent, roll as one piece, a pillow at the breastbone.',
				'Raise the head of the bed to help.'
			],
			watch: ['Lines and drains on the side one rolls to.'],
			never: ['Never pull on a rail or on somebody’s neck.', 'Never push up through the arms.']
		},
		{
			code: 'edge-of-bed',
			name: 'Sitting on the edge of the bed',
			needs: ['Readings lying down first'],
			dose: { minutes: [5, 10], timesADay: [2, 3], words: '5 to 10 minutes, feet down, 2 to 3 times a day' },
			howTo: ['Roll, let the legs down, come up sideways with help at the back.', 'Both feet on the floor.'],
			watch: ['The first pressure after sitting up.', 'Dizziness, pallor, sweat.'],
			never: ['Never alone the first time.', 'Never push up through the arms.']
		},
		{
			code: 'self-feeding',
			name: 'Eating without help',
			clearance: 'oral-intake',
			dose: { timesADay: [3, 3], words: 'at meals, sitting upright' },
			howTo: ['Sit upright, table near, elbows on it.', 'Small mouthfuls.'],
			watch: ['A cough or a wet voice after swallowing.', 'Getting tired before the plate is empty.'],
			never: ['Never lying back.']
		}
	]
);
