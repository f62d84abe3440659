import { askClearance } from '../../../clearances/actions';
import { noteWound } from '../../../wounds/actions';
import { ToldLines } from '../lines';
import { done, reading } from '../readings';
import type { Telling } from '../telling';

/**
 * Day 5, the main story: a corridor walk ended by a fall of the pressure, a call for help that was heard in under
 * two minutes, and an ask for the arm stage that still hangs loose.
 */
export function reeve(t: Telling): void {
	const { when } = t;
	t.admit(when.on(5, '15:30'), 'coordinator', { unit: 'Heron Unit', bed: 'H6' }, when.on(5, '09:00'));
	const asked = t.refer(when.on(5, '16:45'), 'surgeon', {
		service: 'physiotherapy',
		priority: 'soon',
		question:
			'Four grafts, both mammaries used, diabetic: mind the breastbone. Please begin tomorrow and tell me when you think the arms are ready.'
	});
	t.accept(when.on(5, '17:10'), 'therapist', asked);
	t.move(when.on(4, '11:30'), 'coordinator', { unit: 'Tern Ward', bed: 'T4' });
	t.session(when.on(4, '14:00'), 'therapist', {
		level: 2,
		minutes: 20,
		before: reading(78, 126, 72, 95, { rr: 18, pain: 4 }),
		after: reading(86, 130, 74, 95, { rr: 18, rpe: 12, pain: 4 }),
		activities: done(
			{ code: 'deep-breathing', repetitions: 10 },
			{ code: 'sit-to-stand', repetitions: 4, assistance: 'two' },
			{ code: 'chair-sitting', minutes: 20 }
		)
	});
	t.session(when.on(3, '10:15'), 'therapist', {
		level: 3,
		minutes: 25,
		before: reading(76, 124, 72, 96, { rr: 16, pain: 3 }),
		after: reading(84, 134, 74, 96, { rr: 18, rpe: 12, pain: 3 }),
		activities: done(
			{ code: 'room-walk', minutes: 4, assistance: 'one' },
			{ code: 'seated-wash', assistance: 'one' }
		)
	});
	t.session(when.on(2, '10:30'), 'therapist', {
		level: 4,
		minutes: 25,
		before: reading(76, 126, 74, 96, { rr: 16, pain: 2 }),
		during: [reading(84, 132, 74, 95, { posture: 'standing', rpe: 12, work: 1 })],
		after: reading(84, 132, 76, 96, { rr: 18, rpe: 12, pain: 2 }),
		activities: done(
			{ code: 'standing-exercise', repetitions: 10 },
			{ code: 'hall-walk', minutes: 6, distanceM: 120, assistance: 'one' }
		)
	});
	fall(t);
	t.say(
		when.on(1, '15:50'),
		'physician',
		asked,
		'Dry on the morning bloods and two tablets that lower the pressure at the same hour. One moved to the evening, fluids up. Walk again tomorrow, half the distance first.'
	);
	t.session(when.today(180), 'therapist', {
		level: 5,
		minutes: 25,
		before: reading(76, 126, 74, 96, { rr: 16, pain: 2 }),
		during: [reading(84, 130, 74, 96, { posture: 'standing', rpe: 12, work: 1 })],
		after: reading(84, 130, 74, 96, { rr: 18, rpe: 12, pain: 2 }),
		activities: done({ code: 'hall-walk-long', minutes: 8, distanceM: 160, assistance: 'one' })
	});
	t.say(
		when.today(120),
		'nurse',
		asked,
		'Wound dry, no click on coughing. Sugar 8.1 before lunch. Asks when he may shave properly.'
	);
	t.deed(when.today(40), 'therapist', (as, id) =>
		askClearance(as, id, {
			kind: 'arm-stage',
			question:
				'Level 5 reached, wound dry, breastbone stable on coughing, pressure steady today. May the arm stage start?',
			proposed: { maxElevationDeg: 90 }
		})
	);
}

/** The walk that was stopped, the call, and the measuring again. */
function fall(t: Telling): void {
	const { when } = t;
	const walk = t.session(when.on(1, '14:02'), 'therapist', {
		level: 5,
		minutes: 18,
		before: reading(78, 128, 74, 96, { rr: 16, pain: 2 }),
		during: [reading(88, 122, 72, 95, { posture: 'standing', rpe: 13, work: 1 })],
		after: reading(92, 108, 66, 94, { rr: 20, rpe: 14, pain: 2 }),
		symptoms: ['light-headedness'],
		activities: done({ code: 'hall-walk-long', minutes: 7, distanceM: 140, assistance: 'one' })
	});
	const call = t.raise(
		when.on(1, '14:05'),
		'therapist',
		{
			grade: 'high',
			situation: 'Systolic pressure fell from 128 to 108 in the corridor, light-headed, sitting now.',
			background: 'Four grafts, day 4, level 5, on a rate-slowing drug.',
			assessment: 'Walk stopped. Pulse 92, saturation 94 %. Conscious and talking.',
			request: 'Please come and measure again with me.'
		},
		walk
	);
	// One minute and fifty seconds later: the second step of the chain was ten seconds away.
	t.take(when.on(1, '14:05') + 110_000, 'nurse', call, 3);
	t.arrive(when.on(1, '14:09'), 'nurse', call);
	t.settle(when.on(1, '14:21'), 'nurse', call, {
		outcome: 'better after rest and fluids',
		note: 'Legs up, a glass of water. 122/70 after five minutes, pulse 80. Physician told.',
		informed: 'Marta Lisowska',
		recheckMinutes: 30
	});
	t.session(when.on(1, '14:52'), 'nurse', {
		level: 5,
		minutes: 3,
		before: reading(78, 124, 72, 96, { rr: 16, pain: 2 }),
		after: reading(78, 124, 72, 96, { rr: 16, rpe: 7, pain: 2 }),
		activities: done({ code: 'chair-sitting', minutes: 3 })
	});
}

/** Day 6: the arm stage given with a limit, and used. */
export function sorrel(t: Telling): void {
	const { when } = t;
	t.admit(when.on(6, '14:40'), 'coordinator', { unit: 'Heron Unit', bed: 'H1' }, when.on(6, '09:20'));
	const asked = t.refer(when.on(6, '15:30'), 'surgeon', {
		service: 'physiotherapy',
		priority: 'routine',
		question: 'Valve replaced, otherwise well, plays the cello: arms will be her question. Please begin.'
	});
	t.accept(when.on(6, '15:50'), 'therapist', asked);
	t.move(when.on(5, '10:45'), 'coordinator', { unit: 'Tern Ward', bed: 'T5' });
	t.session(when.on(3, '11:00'), 'therapist', {
		level: 4,
		minutes: 25,
		before: reading(74, 118, 70, 97, { rr: 14, pain: 2 }),
		after: reading(86, 128, 72, 97, { rr: 16, rpe: 12, pain: 2 }),
		activities: done({ code: 'hall-walk', minutes: 6, distanceM: 150, assistance: 'one' })
	});
	t.session(when.on(2, '11:20'), 'therapist', {
		level: 5,
		minutes: 25,
		before: reading(72, 120, 70, 97, { rr: 14, pain: 2 }),
		after: reading(86, 132, 74, 97, { rr: 16, rpe: 12, pain: 2 }),
		activities: done({ code: 'hall-walk-long', minutes: 9, distanceM: 260, assistance: 'alone' })
	});
	t.deed(when.on(2, '11:55'), 'nurse', (as, id) =>
		noteWound(as, id, { wound: 'dry', sternum: 'stable', note: 'Edges together, no heat.' })
	);
	const arms = t.ask(
		when.on(2, '12:05'),
		'therapist',
		'arm-stage',
		'Level 5, wound closed, no click. May she lift both arms?'
	);
	t.give(when.on(2, '14:31'), 'surgeon', arms, {
		limits: { maxElevationDeg: 90, maxLoadKg: 1, text: 'Both arms together' },
		reviewOn: when.date(14),
		note: 'Stop at the first click. No bow yet.'
	});
	t.session(when.on(1, '11:10'), 'therapist', {
		level: 5,
		minutes: 25,
		before: reading(72, 120, 70, 97, { rr: 14, pain: 2 }),
		after: reading(84, 128, 72, 97, { rr: 16, rpe: 12, pain: 2 }),
		activities: done(
			{ code: 'arm-exercise', repetitions: 8, elevationDeg: 80 },
			{ code: 'hall-walk-long', minutes: 10, distanceM: 300, assistance: 'alone' }
		)
	});
	t.say(
		when.on(1, '11:50'),
		'therapist',
		asked,
		'Both arms to 80 degrees, eight times, no click, pain 2. She is delighted.'
	);
}

/** Day 6: the arm stage refused, with the reason in front of everybody. */
export function brackwater(t: Telling): void {
	const { when } = t;
	t.admit(when.on(6, '16:30'), 'nurse2', { unit: 'Heron Unit', bed: 'H3' }, when.on(6, '10:40'));
	const asked = t.refer(when.on(6, '17:15'), 'surgeon2', {
		service: 'physiotherapy',
		priority: 'routine',
		question: 'Four grafts, heavy smoker until March. Please work on the chest first.'
	});
	t.accept(when.on(6, '17:30'), 'therapist2', asked);
	t.move(when.on(4, '12:10'), 'coordinator', { unit: 'Tern Ward', bed: 'T6' });
	t.session(when.on(3, '13:30'), 'therapist2', {
		level: 3,
		minutes: 25,
		before: reading(80, 136, 78, 92, { rr: 20, pain: 3, oxygenLpm: 2 }),
		after: reading(88, 142, 80, 88, { rr: 22, rpe: 13, pain: 4, oxygenLpm: 2 }),
		activities: done(
			{ code: 'deep-breathing', repetitions: 10 },
			{ code: 'splinted-cough', repetitions: 5 },
			{ code: 'room-walk', minutes: 3, assistance: 'one' }
		)
	});
	t.session(when.on(1, '09:40'), 'therapist2', {
		level: 5,
		minutes: 25,
		before: reading(78, 134, 78, 94, { rr: 18, pain: 3 }),
		after: reading(86, 142, 80, 93, { rr: 20, rpe: 13, pain: 3 }),
		activities: done({ code: 'hall-walk-long', minutes: 7, distanceM: 150, assistance: 'one' })
	});
	new ToldLines(t).oxygen(when.on(2, '08:20'), 'nurse2', 0);
	const arms = t.ask(
		when.on(1, '10:20'),
		'therapist2',
		'arm-stage',
		'Level 5 today. Some moisture at the lower end of the wound since this morning. May the arm stage start?'
	);
	t.withhold(
		when.on(1, '12:10'),
		'surgeon2',
		arms,
		'Not with a moist wound and that cough. Swab taken, I look at it on Thursday rounds. Legs and walking go on as they are.'
	);
	t.say(
		when.on(1, '13:00'),
		'nurse',
		asked,
		'Dressing changed at 12:30, a coin-sized spot. Temperature 37.1.'
	);
}
