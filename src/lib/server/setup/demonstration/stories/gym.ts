import { askClearance } from '../../../clearances/actions';
import { MINUTE } from '$lib/domain/core/time';
import { prescribeRange } from '../../../limits/range-actions';
import { done, reading } from '../readings';
import type { Telling, ToldVisit } from '../telling';
import { home } from './home';

const GYM = 'East Gym';

/** Week 4: just begun, walks on the flat, and the treadmill is asked for. */
export function thorne(t: Telling): void {
	const { when } = t;
	home(t, { operated: 28, bed: 'T3', homeOn: 20 });
	const asked = t.refer(when.on(15, '10:00'), 'surgeon', {
		service: 'outpatient-programme',
		priority: 'routine',
		question: 'Well at two weeks, wound closed. Please take her on for the supervised programme.'
	});
	t.accept(when.on(14, '09:20'), 'therapist', asked);
	t.deed(when.on(14, '09:30'), 'physician', (as, id) =>
		prescribeRange(as, id, { ...RANGE, method: '164-0.7age' })
	);
	const visits = t.book(when.on(14, '09:40'), 'coordinator', {
		kind: 'series',
		from: when.date(-8),
		weekdays: ['mon', 'wed', 'fri'],
		time: '10:00',
		count: 12,
		minutes: 60,
		place: GYM
	});
	const past = keepVisits(t, visits);
	for (const { startsAt } of past.slice(-1)) {
		t.session(startsAt + 50 * MINUTE, 'therapist', {
			level: 6,
			minutes: 35,
			about: OUTPATIENT,
			before: reading(70, 122, 74, 97, { rr: 14, pain: 1 }),
			during: [reading(94, 140, 76, 97, { posture: 'standing', rpe: 12, work: 1 })],
			after: reading(80, 126, 74, 97, { rr: 16, rpe: 12, pain: 1 }),
			activities: done({ code: 'leg-cycle', minutes: 15 }, { code: 'standing-warm-up', minutes: 8 })
		});
	}
	t.deed(when.today(150), 'therapist', (as, id) =>
		askClearance(as, id, {
			kind: 'treadmill',
			question: 'Four weeks, steady on the bicycle at exertion 12. May she walk on the treadmill?',
			proposed: { text: 'Flat, up to 2.5 km/h' }
		})
	);
}

/** Week 6: on the treadmill within limits. */
export function ferrow(t: Telling): void {
	const { when } = t;
	home(t, { operated: 42, bed: 'T5', homeOn: 35 });
	const asked = t.refer(when.on(30, '11:10'), 'surgeon', {
		service: 'outpatient-programme',
		priority: 'routine',
		question: 'Valve replaced, sings in a choir, wants his breath back. Please begin in week 4.'
	});
	t.accept(when.on(29, '15:30'), 'therapist', asked);
	t.deed(when.on(29, '15:40'), 'physician', (as, id) =>
		prescribeRange(as, id, { ...RANGE, method: 'walk-test' })
	);
	const visits = t.book(when.on(29, '15:50'), 'coordinator', {
		kind: 'series',
		from: when.date(-13),
		weekdays: ['tue', 'thu'],
		time: '14:00',
		count: 12,
		minutes: 60,
		place: GYM
	});
	const treadmill = t.ask(
		when.on(14, '09:00'),
		'therapist',
		'treadmill',
		'Walks forty minutes a day at home without symptoms. Treadmill from the first visit?'
	);
	t.give(when.on(14, '13:20'), 'physician', treadmill, {
		limits: { maxMinutes: 20, text: 'Level, no running' },
		reviewOn: when.date(28)
	});
	for (const { startsAt } of keepVisits(t, visits).slice(-2)) {
		t.session(startsAt + 55 * MINUTE, 'therapist2', {
			level: 6,
			minutes: 40,
			about: OUTPATIENT,
			before: reading(68, 124, 74, 97, { rr: 14, pain: 0 }),
			during: [
				reading(88, 140, 76, 97, { posture: 'standing', rpe: 11, work: 1 }),
				reading(98, 150, 78, 97, { posture: 'standing', rpe: 12, work: 2 })
			],
			after: reading(76, 128, 74, 97, { rr: 16, rpe: 12, pain: 0 }),
			activities: done({ code: 'treadmill-walk', minutes: 18, distanceM: 1200 })
		});
	}
	t.say(
		when.on(2, '16:10'),
		'therapist2',
		asked,
		'Eighteen minutes level at 4 km/h, exertion 12, sang on the way out.'
	);
}

/** Week 8: mostly there, one visit missed. */
export function mallin(t: Telling): void {
	const { when } = t;
	home(t, { operated: 56, bed: 'T7', homeOn: 47 });
	const asked = t.refer(when.on(44, '10:30'), 'surgeon2', {
		service: 'outpatient-programme',
		priority: 'routine',
		question: 'Slow start, lives alone, afraid of stairs. Please take her on from week 5.'
	});
	t.accept(when.on(43, '09:10'), 'therapist2', asked);
	const visits = t.book(when.on(43, '09:30'), 'coordinator', {
		kind: 'series',
		from: when.date(-15),
		weekdays: ['mon', 'wed', 'fri'],
		time: '11:30',
		count: 15,
		minutes: 60,
		place: GYM
	});
	keepVisits(t, visits, { missed: 2, why: 'Bus did not run. Called her, she comes next time.' });
	const next = visits.findLast(({ startsAt }) => startsAt < when.ago(-5 * 24 * 60));
	if (next) {
		t.confirm(when.today(100), 'coordinator', next);
	}
	t.say(
		when.on(3, '12:50'),
		'therapist2',
		asked,
		'Did a whole flight in the stairwell today, twice. Eight weeks this week: I shall ask about the precautions once the wound clinic has seen her.'
	);
}

/** Week 10: precautions ended, nearly done. */
export function oakes(t: Telling): void {
	const { when } = t;
	home(t, { operated: 70, bed: 'T8', homeOn: 62 });
	const asked = t.refer(when.on(58, '14:00'), 'surgeon', {
		service: 'outpatient-programme',
		priority: 'routine',
		question: 'Three grafts, back to the boatyard by summer if you let him. Please begin in week 4.'
	});
	t.accept(when.on(57, '09:00'), 'therapist', asked);
	const visits = t.book(when.on(57, '09:15'), 'coordinator', {
		kind: 'series',
		from: when.date(-10),
		weekdays: ['tue', 'fri'],
		time: '09:00',
		count: 10,
		minutes: 60,
		place: GYM
	});
	keepVisits(t, visits);
	const end = t.ask(
		when.on(9, '10:30'),
		'physician2',
		'precautions-end',
		'Nine weeks, no click, no pain, wound closed. May the precautions for the breastbone end?'
	);
	t.give(when.on(9, '17:05'), 'surgeon', end, {
		note: 'Heavy loads in steps: 10 kg for a fortnight, then as he likes.'
	});
	t.say(when.on(8, '10:10'), 'therapist', asked, 'Told him, and wrote the steps down for the boatyard.');
}

const RANGE = { hrMin: 85, hrMax: 108, rpeMin: 11, rpeMax: 13 } as const;

const OUTPATIENT = {
	phase: 'outpatient',
	set: 'outpatient',
	prescribed: RANGE
} as const;

/**
 * What became of the visits so far: attended, or one of them missed. Patients with a telephone say yes to the
 * newest reminder, whether that visit is over or still ahead.
 * @returns those that are over
 */
function keepVisits(t: Telling, visits: ToldVisit[], but?: { missed: number; why: string }): ToldVisit[] {
	const { start } = t.when;
	const reminded = visits.findLast(
		({ remindedAt }) => remindedAt !== null && remindedAt + 15 * MINUTE < start
	);
	if (reminded?.remindedAt != null) {
		t.reply(reminded.remindedAt + 12 * MINUTE, 'YES');
	}
	const past = visits.filter(({ startsAt }) => startsAt + 60 * MINUTE < start);
	past.forEach((visit, index) => {
		if (but?.missed === index) {
			t.miss(visit.startsAt + 45 * MINUTE, 'therapist', visit, but.why);
		} else {
			t.attend(visit.startsAt + 5 * MINUTE, 'therapist', visit);
		}
	});
	return past;
}
