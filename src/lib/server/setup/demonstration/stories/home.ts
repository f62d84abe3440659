import { done, reading } from '../readings';
import type { Telling } from '../telling';

interface Stay {
	/** Days ago. */
	operated: number;
	bed: string;
	/** Days ago. */
	homeOn: number;
}

/** The stay in hospital of somebody who comes to the gym by now: short, because the programme is their story. */
export function home(t: Telling, { operated, bed, homeOn }: Stay): void {
	const { when } = t;
	const { surgeon } = t.patient;
	t.admit(
		when.on(operated, '14:30'),
		'coordinator',
		{ unit: 'Heron Unit', bed: 'H5' },
		when.on(operated, '09:30')
	);
	const asked = t.refer(when.on(operated, '15:45'), surgeon, {
		service: 'physiotherapy',
		priority: 'routine',
		question: 'Please begin tomorrow, in small steps.'
	});
	t.accept(when.on(operated, '16:10'), 'therapist', asked);
	t.move(when.on(operated - 1, '11:00'), 'coordinator', { unit: 'Tern Ward', bed });
	t.session(when.on(homeOn + 3, '10:00'), 'therapist', {
		level: 5,
		minutes: 25,
		before: reading(74, 124, 74, 96, { rr: 16, pain: 2 }),
		after: reading(82, 132, 74, 96, { rr: 16, rpe: 12, pain: 2 }),
		activities: done({ code: 'hall-walk-long', minutes: 8, distanceM: 240, assistance: 'alone' })
	});
	const stairs = t.ask(
		when.on(homeOn + 2, '09:30'),
		'therapist',
		'stairs',
		'Level 5, steady. Stairs before home?'
	);
	t.give(when.on(homeOn + 2, '12:00'), 'physician', stairs, { limits: { helpers: 'one' } });
	t.session(when.on(homeOn + 1, '10:00'), 'therapist', {
		level: 6,
		minutes: 25,
		before: reading(72, 124, 74, 97, { rr: 14, pain: 1 }),
		during: [reading(82, 136, 76, 96, { posture: 'standing', rpe: 13, work: 1 })],
		after: reading(80, 132, 74, 97, { rr: 16, rpe: 13, pain: 1 }),
		activities: done({ code: 'stairs', steps: 14, assistance: 'one', helper: 'Sefa Moran' })
	});
	t.close(
		when.on(homeOn, '10:00'),
		'therapist',
		asked,
		'One flight with a helper, exercises explained, home today.'
	);
	t.move(when.on(homeOn, '11:00'), 'coordinator', { unit: 'East Gym', bed: null });
}
