import { acknowledgeRefusal } from '../../../clearances/refusal';
import { FROM_THEATRE, ToldLines } from '../lines';
import { done, reading } from '../readings';
import type { Telling } from '../telling';

const UNIT = 'Heron Unit';

/** Day 0: out of theatre, referred, and not yet accepted. */
export function harrow(t: Telling): void {
	const { when } = t;
	t.admit(when.today(170), 'coordinator', { unit: UNIT, bed: 'H1' }, when.today(410));
	new ToldLines(t).in(when.today(165), 'nurse3', ...FROM_THEATRE, 'pacing-wires');
	t.refer(when.today(50), 'surgeon', {
		service: 'physiotherapy',
		priority: 'soon',
		question:
			'Valve replaced this morning, still drowsy. Please see her tomorrow: breathing with a pillow first, then the edge of the bed. She was short of breath on one flight of stairs before the operation.'
	});
}

/** Day 1: first treatment in bed and on its edge. */
export function pell(t: Telling): void {
	const { when } = t;
	t.admit(when.on(1, '13:40'), 'coordinator', { unit: UNIT, bed: 'H2' }, when.on(1, '09:10'));
	new ToldLines(t)
		.in(when.on(1, '13:50'), 'nurse3', ...FROM_THEATRE, 'pacing-wires')
		.out(when.on(1, '15:50'), 'nurse3', 'endotracheal-tube')
		.oxygen(when.on(1, '15:55'), 'nurse3', 4)
		.out(when.today(310), 'nurse3', 'arterial-line');
	const asked = t.refer(when.on(1, '16:20'), 'surgeon', {
		service: 'physiotherapy',
		priority: 'routine',
		question:
			'Three grafts, left internal mammary used. Tube out at 15:50. Please start breathing and get him up.'
	});
	t.accept(when.on(1, '16:55'), 'therapist', asked);
	t.say(
		when.today(330),
		'nurse3',
		asked,
		'Slept in short stretches. Pain 3 at rest, 5 on coughing; had his tablets an hour ago. Two chest drains still in.'
	);
	t.session(when.today(290), 'therapist', {
		level: 1,
		minutes: 20,
		before: reading(84, 118, 68, 95, { posture: 'lying', rr: 18, pain: 3, oxygenLpm: 2 }),
		during: [reading(90, 120, 70, 94, { rr: 20, rpe: 11, work: 1 })],
		after: reading(88, 116, 68, 95, { posture: 'lying', rr: 18, rpe: 11, pain: 4, oxygenLpm: 2 }),
		activities: done(
			{ code: 'deep-breathing', repetitions: 10 },
			{ code: 'splinted-cough', repetitions: 3 },
			{ code: 'ankle-pumps', repetitions: 20 },
			{ code: 'edge-of-bed', minutes: 5, assistance: 'two' }
		)
	});
	t.say(
		when.today(250),
		'therapist',
		asked,
		'Coughs well with the pillow. Sat on the edge for five minutes with two of us. Chair this afternoon if the drains come out.'
	);
}

/** Day 3 and a long time with the tube: rhythm irregular, and nothing to drink yet. */
export function vantry(t: Telling): void {
	const { when } = t;
	t.admit(when.on(3, '17:20'), 'coordinator', { unit: UNIT, bed: 'H3' }, when.on(3, '08:30'));
	new ToldLines(t)
		.in(when.on(3, '17:30'), 'nurse', ...FROM_THEATRE, 'pacing-wires')
		.out(when.on(1, '10:20'), 'nurse', 'chest-drain')
		.out(when.on(1, '16:45'), 'physician', 'endotracheal-tube')
		.oxygen(when.on(1, '16:50'), 'nurse', 6)
		.out(when.today(240), 'nurse3', 'arterial-line');
	const physio = t.refer(when.on(2, '09:05'), 'physician', {
		service: 'physiotherapy',
		priority: 'routine',
		question: 'Ventilated since the operation. Please move her limbs and keep an eye on the left shoulder.'
	});
	t.accept(when.on(2, '09:40'), 'therapist2', physio);
	t.session(when.on(2, '10:30'), 'therapist2', {
		level: 1,
		minutes: 15,
		about: { conscious: false, followsCommands: false, airway: 'tube' },
		before: reading(92, 108, 58, 97, { posture: 'lying', bpSource: 'arterial' }),
		after: reading(94, 110, 60, 97, { posture: 'lying', bpSource: 'arterial' }),
		activities: done(
			{ code: 'passive-legs', repetitions: 8 },
			{ code: 'passive-arms', repetitions: 6, elevationDeg: 40 }
		)
	});
	const speech = t.refer(when.on(1, '17:30'), 'physician', {
		service: 'speech-therapy',
		priority: 'urgent',
		question: 'Tube out at 16:45 after 52 hours. Voice is a whisper. Is it safe to drink?'
	});
	t.accept(when.on(1, '17:45'), 'speech', speech);
	const drink = t.ask(when.on(1, '17:50'), 'nurse', 'oral-intake', 'She asks for water. May she have sips?');
	t.withhold(
		when.on(1, '18:35'),
		'speech',
		drink,
		'Wet voice and a late, weak cough after 3 ml of water. Nothing by mouth tonight, mouth care every two hours. I look again tomorrow at ten.'
	);
	t.deed(when.on(1, '18:40'), 'nurse', (as) => acknowledgeRefusal(as, drink.id));
	t.session(when.today(270), 'therapist2', {
		level: 1,
		minutes: 18,
		about: { rhythm: 'atrial-fibrillation' },
		before: reading(98, 112, 62, 94, { posture: 'lying', rr: 20, pain: 3, oxygenLpm: 4 }),
		during: [reading(108, 114, 64, 93, { rr: 22, rpe: 13, work: 1 })],
		after: reading(112, 110, 62, 93, { posture: 'lying', rr: 22, rpe: 13, pain: 3, oxygenLpm: 4 }),
		activities: done(
			{ code: 'deep-breathing', repetitions: 8 },
			{ code: 'bed-mobility', assistance: 'two' },
			{ code: 'edge-of-bed', minutes: 4, assistance: 'two' }
		)
	});
	t.say(
		when.today(200),
		'physician',
		physio,
		'The flutter is known since last night, rate control has been changed this morning. Carry on in small steps and stop at 120.'
	);
}
