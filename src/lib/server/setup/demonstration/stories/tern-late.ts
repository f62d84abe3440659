import { done, reading } from '../readings';
import type { Telling } from '../telling';

/** Day 7: stairs cleared, nearly home. */
export function lune(t: Telling): void {
	const { when } = t;
	t.admit(when.on(7, '15:20'), 'coordinator', { unit: 'Heron Unit', bed: 'H2' }, when.on(7, '09:30'));
	const asked = t.refer(when.on(7, '16:00'), 'surgeon', {
		service: 'physiotherapy',
		priority: 'routine',
		question:
			'Mitral repair. Home is a farmhouse with a steep flight, daughter helps. Please aim for the stairs.'
	});
	t.accept(when.on(7, '16:20'), 'therapist', asked);
	t.move(when.on(6, '11:15'), 'coordinator', { unit: 'Tern Ward', bed: 'T7' });
	t.session(when.on(3, '09:30'), 'therapist', {
		level: 5,
		minutes: 25,
		before: reading(70, 122, 72, 97, { rr: 14, pain: 2 }),
		after: reading(79, 132, 74, 97, { rr: 16, rpe: 12, pain: 2 }),
		activities: done({ code: 'hall-walk-long', minutes: 9, distanceM: 280, assistance: 'alone' })
	});
	const stairs = t.ask(
		when.on(3, '10:10'),
		'therapist',
		'stairs',
		'Steady at level 5 for two days. May we try half a flight with a helper?'
	);
	t.give(when.on(3, '12:40'), 'physician', stairs, {
		limits: { helpers: 'one' },
		note: 'One flight at most, one helper behind her.'
	});
	t.session(when.on(2, '10:00'), 'therapist', {
		level: 6,
		minutes: 25,
		before: reading(70, 124, 72, 97, { rr: 14, pain: 1 }),
		during: [reading(82, 136, 74, 96, { posture: 'standing', rpe: 13, work: 1 })],
		after: reading(79, 132, 74, 97, { rr: 16, rpe: 13, pain: 1 }),
		activities: done({ code: 'stairs', steps: 12, assistance: 'one', helper: 'Sefa Moran' })
	});
	const programme = t.refer(when.on(1, '09:50'), 'surgeon', {
		service: 'outpatient-programme',
		priority: 'routine',
		question: 'Home in two days. Please take her on from week 4.'
	});
	t.accept(when.on(1, '11:30'), 'therapist', programme);
	t.book(when.on(1, '12:15'), 'coordinator', {
		kind: 'single',
		startsAt: when.on(-20, '11:00'),
		minutes: 60,
		place: 'East Gym'
	});
	t.say(
		when.on(1, '12:30'),
		'therapist',
		asked,
		'One flight, twelve steps, one rest. Daughter comes tomorrow to learn how to walk behind her.'
	);
}

/** Day 8: a fast, irregular pulse this hour; somebody has it and is there. */
export function carrow(t: Telling): void {
	const { when } = t;
	t.admit(when.on(8, '14:50'), 'coordinator', { unit: 'Heron Unit', bed: 'H4' }, when.on(8, '10:00'));
	const asked = t.refer(when.on(8, '15:40'), 'surgeon2', {
		service: 'physiotherapy',
		priority: 'routine',
		question: 'Three grafts. Slow to wake, a little confused at night. Please keep him moving by day.'
	});
	t.accept(when.on(8, '16:15'), 'therapist', asked);
	t.move(when.on(6, '12:00'), 'coordinator', { unit: 'Tern Ward', bed: 'T8' });
	t.session(when.on(2, '14:10'), 'therapist', {
		level: 5,
		minutes: 25,
		before: reading(76, 128, 74, 95, { rr: 16, pain: 2 }),
		after: reading(86, 136, 76, 95, { rr: 18, rpe: 13, pain: 2 }),
		activities: done({ code: 'hall-walk-long', minutes: 8, distanceM: 200, assistance: 'one' })
	});
	const walk = t.session(when.today(52), 'therapist', {
		level: 4,
		minutes: 10,
		about: { rhythm: 'atrial-fibrillation' },
		before: reading(104, 118, 72, 94, { rr: 20, pain: 2 }),
		after: reading(124, 114, 70, 93, { rr: 22, rpe: 14, pain: 2 }),
		symptoms: ['palpitations'],
		activities: done({ code: 'hall-walk', minutes: 3, distanceM: 40, assistance: 'one' })
	});
	const call = t.raise(
		when.today(38),
		'therapist',
		{
			grade: 'medium',
			situation: 'Pulse irregular and fast since the walk, 124 after and 104 before it.',
			background: 'Three grafts, day 8, rhythm was regular on his last walk.',
			assessment: 'Feels the heart racing, pressure 114 over 70, no chest pain. In bed now.',
			request: 'Please record a rhythm strip and let the physician know.'
		},
		walk
	);
	t.take(when.today(35), 'nurse2', call, 5);
	t.arrive(when.today(30), 'nurse2', call);
	t.say(
		when.today(22),
		'nurse2',
		asked,
		'Strip recorded and sent up, 118 and irregular at rest. Physician on her way, blood taken.'
	);
}
