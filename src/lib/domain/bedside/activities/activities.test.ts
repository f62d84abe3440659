import { describe, expect, it } from 'vitest';
import { LEVEL_BANDS } from '../levels';
import { ACTIVITIES, activitiesUpTo, activityByCode } from './activities';
import { ACTIVITY_CODES } from './codes';

const inpatient = ACTIVITIES.filter(({ phase }) => phase === 'inpatient');

describe('the activities catalogue', () => {
	it('has one entry for each code, in the order of the codes', () => {
		expect(ACTIVITIES.map(({ code }) => code)).toEqual([...ACTIVITY_CODES]);
	});

	it.each(inpatient.map((activity) => [activity.code, activity] as const))(
		'%s has the band of its level',
		(_code, activity) => {
			const { from, to } = LEVEL_BANDS[activity.level];
			expect(activity.mets).toEqual([from, to]);
		}
	);

	it.each(ACTIVITIES.map((activity) => [activity.code, activity] as const))(
		'%s has a dose, a how-to and its lines',
		(_code, activity) => {
			for (const lines of [activity.howTo, activity.watch, activity.never]) {
				expect(lines.length).toBeGreaterThan(0);
				expect(lines.every((line) => /^[A-Z].*\.$/.test(line))).toBe(true);
			}
			const { minutes, repetitions, timesADay } = activity.dose;
			const spans = [minutes, repetitions, timesADay].filter((span) => span !== null);
			expect(spans.length).toBeGreaterThan(0);
			expect(spans.every(([from, to]) => from > 0 && from <= to)).toBe(true);
		}
	);

	// Figures of the ward: common practice, no published source.
	it.each([
		['ankle-pumps', 1, null, { repetitions: [15, 20] }],
		['leg-slides', 1, null, { repetitions: [5, 5] }],
		['chair-sitting', 2, null, { minutes: [15, 30], timesADay: [2, 4] }],
		['hall-walk', 4, null, { minutes: [5, 7], timesADay: [3, 4] }],
		['hall-walk-long', 5, null, { minutes: [8, 10], timesADay: [3, 4] }],
		['arm-exercise', 5, 'arm-stage', { repetitions: [5, 10] }],
		['stairs', 6, 'stairs', { repetitions: [1, 1] }],
		['self-feeding', 1, 'oral-intake', { timesADay: [3, 3] }],
		['treadmill-walk', 6, 'treadmill', { minutes: [20, 45] }]
	] as const)('%s: level %d, clearance %s', (code, level, clearance, dose) => {
		expect(activityByCode(code)).toMatchObject({ level, clearance, dose });
	});

	it('lets the ward walk without asking, unless somebody holds it', () => {
		const held = (kind: string) => ACTIVITIES.filter(({ heldBy }) => heldBy === kind).map(({ code }) => code);
		expect(held('corridor')).toEqual(['hall-walk', 'hall-walk-long']);
		expect(held('out-of-bed')).toEqual([
			'chair-sitting',
			'sit-to-stand',
			'seated-exercise',
			'bedside-walk',
			'room-walk',
			'seated-wash',
			'standing-warm-up',
			'standing-exercise'
		]);
	});

	it('knows what moves the arms, what walks and what is done to the patient', () => {
		const codes = (test: (activity: (typeof ACTIVITIES)[number]) => boolean) =>
			ACTIVITIES.filter(test).map(({ code }) => code);
		expect(codes(({ arms }) => arms)).toEqual(['passive-arms', 'active-arms', 'shaving', 'arm-exercise']);
		expect(codes(({ mode }) => mode === 'passive')).toEqual(['passive-legs', 'passive-arms']);
		expect(codes(({ walking }) => walking)).toEqual([
			'bedside-walk',
			'room-walk',
			'hall-walk',
			'hall-walk-long',
			'stairs',
			'treadmill-walk'
		]);
		expect(codes(({ stairs }) => stairs)).toEqual(['stairs']);
	});
});

describe('activitiesUpTo', () => {
	it('offers what a level has reached and nothing above it', () => {
		expect(activitiesUpTo(1).every(({ level }) => level === 1)).toBe(true);
		expect(activitiesUpTo(4).map(({ code }) => code)).not.toContain('arm-exercise');
		expect(activitiesUpTo(5).map(({ code }) => code)).toContain('arm-exercise');
		expect(activitiesUpTo(6)).toHaveLength(ACTIVITIES.length);
	});
});
