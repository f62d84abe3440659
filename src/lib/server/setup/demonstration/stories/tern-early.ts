import { FROM_THEATRE, ToldLines } from '../lines';
import { done, reading } from '../readings';
import type { Telling } from '../telling';

/** Day 3 after a small incision: no precautions for the breastbone, a level a day. */
export function aske(t: Telling): void {
	const { when } = t;
	t.admit(when.on(3, '14:15'), 'nurse', { unit: 'Heron Unit', bed: 'H4' }, when.on(3, '09:45'));
	new ToldLines(t)
		.in(when.on(3, '14:25'), 'nurse', ...FROM_THEATRE)
		.out(when.on(3, '14:55'), 'nurse', 'endotracheal-tube')
		.oxygen(when.on(3, '15:00'), 'nurse', 3)
		.out(when.on(2, '08:40'), 'nurse2', 'arterial-line', 'urinary-catheter')
		.out(when.on(1, '09:05'), 'nurse', 'central-line')
		.oxygen(when.on(1, '09:10'), 'nurse', 0);
	const asked = t.refer(when.on(3, '15:10'), 'surgeon2', {
		service: 'physiotherapy',
		priority: 'routine',
		question:
			'Repair through the right side of the chest, breastbone untouched. Arms are free. Please get him going.'
	});
	t.accept(when.on(3, '16:00'), 'therapist2', asked);
	t.move(when.on(2, '10:30'), 'coordinator', { unit: 'Tern Ward', bed: 'T1' });
	t.session(when.on(2, '14:00'), 'therapist2', {
		level: 2,
		minutes: 20,
		before: reading(82, 122, 70, 96, { rr: 16, pain: 4 }),
		after: reading(92, 130, 74, 96, { rr: 18, rpe: 12, pain: 4 }),
		activities: done(
			{ code: 'sit-to-stand', repetitions: 5, assistance: 'one' },
			{ code: 'chair-sitting', minutes: 15 }
		)
	});
	t.session(when.on(1, '10:10'), 'therapist2', {
		level: 3,
		minutes: 25,
		before: reading(80, 124, 72, 97, { rr: 16, pain: 3 }),
		after: reading(94, 134, 74, 96, { rr: 18, rpe: 12, pain: 3 }),
		activities: done(
			{ code: 'standing-warm-up', repetitions: 10 },
			{ code: 'room-walk', minutes: 4, assistance: 'one' }
		)
	});
	t.say(
		when.on(1, '15:20'),
		'nurse',
		asked,
		'Washed himself at the basin today, sitting. Line in the neck is out, one drain left.'
	);
}

/** Day 4: one referral accepted, one declined with a reason, and a pressure to keep an eye on. */
export function dunmore(t: Telling): void {
	const { when } = t;
	t.admit(when.on(4, '15:00'), 'coordinator', { unit: 'Heron Unit', bed: 'H5' }, when.on(4, '10:20'));
	new ToldLines(t)
		.in(when.on(4, '15:10'), 'nurse3', ...FROM_THEATRE, 'pacing-wires')
		.out(when.on(4, '15:40'), 'nurse3', 'endotracheal-tube')
		.oxygen(when.on(4, '15:45'), 'nurse3', 2)
		.out(when.on(3, '08:50'), 'nurse3', 'arterial-line', 'urinary-catheter')
		.out(when.on(2, '09:15'), 'nurse', 'chest-drain', 'central-line')
		.oxygen(when.on(2, '09:20'), 'nurse', 0)
		.out(when.on(1, '09:30'), 'nurse', 'pacing-wires', 'peripheral-line');
	const asked = t.refer(when.on(4, '16:10'), 'surgeon', {
		service: 'physiotherapy',
		priority: 'routine',
		question: 'Three grafts, vein from the right leg. Lives alone on a second floor, so stairs matter.'
	});
	t.accept(when.on(4, '16:30'), 'therapist', asked);
	t.move(when.on(3, '11:00'), 'coordinator', { unit: 'Tern Ward', bed: 'T2' });
	const voice = t.refer(when.on(2, '11:15'), 'physician2', {
		service: 'speech-therapy',
		priority: 'routine',
		question: 'Slightly hoarse since the operation. Please look at her voice.'
	});
	t.decline(
		when.on(2, '13:50'),
		'speech',
		voice,
		'Tube in for five hours only, swallows without trouble, hoarseness already better by telephone. Please ask again if it is still there after day 5.'
	);
	t.session(when.on(2, '10:00'), 'therapist', {
		level: 2,
		minutes: 20,
		before: reading(74, 132, 76, 96, { rr: 16, pain: 3 }),
		after: reading(82, 136, 76, 96, { rr: 18, rpe: 11, pain: 3 }),
		activities: done(
			{ code: 'sit-to-stand', repetitions: 5, assistance: 'one' },
			{ code: 'chair-sitting', minutes: 20 }
		)
	});
	t.session(when.on(1, '14:30'), 'therapist', {
		level: 4,
		minutes: 25,
		before: reading(72, 134, 78, 97, { rr: 16, pain: 2 }),
		during: [reading(80, 130, 76, 96, { posture: 'standing', rpe: 12, work: 1 })],
		after: reading(80, 125, 74, 96, { rr: 18, rpe: 12, pain: 2 }),
		activities: done(
			{ code: 'standing-warm-up', repetitions: 10 },
			{ code: 'hall-walk', minutes: 5, distanceM: 90, assistance: 'one' }
		)
	});
	t.say(
		when.on(1, '15:05'),
		'therapist',
		asked,
		'Pressure nine lower after the corridor, no symptoms. Could the water tablet be moved to after the morning walk?'
	);
	t.say(when.on(1, '17:40'), 'physician2', asked, 'Moved to noon from tomorrow. Thank you.');
}
