import { describe, expect, it } from 'vitest';
import { ACTIVITIES } from '../activities/activities';
import type { Context } from '../forms';
import { grades, judge, only } from '../testing/sample';
import { granted, lackingClearance } from './clearances';

const HELD = ACTIVITIES.flatMap(({ code, heldBy }) => (heldBy === null ? [] : [[code, heldBy] as const]));
const NEEDING = ACTIVITIES.filter(({ clearance }) => clearance !== null);

describe('clearance-missing', () => {
	it.each(NEEDING.map(({ code, clearance }) => [code, clearance ?? 'discharge'] as const))(
		'%s stops without %s and not with it',
		(code, clearance) => {
			const activities = [{ code, helper: true, elevationDeg: 40 }];
			expect(grades(judge({ activities }), 'clearance-missing')).toEqual(['stop during']);
			expect(grades(judge({ context: { clearances: null }, activities }), 'clearance-missing')).toEqual([
				'stop during'
			]);
			expect(judge({ context: { clearances: [clearance] }, activities }).findings).toEqual([]);
		}
	);

	it.each(HELD)('%s stops while %s is refused, and not before anybody was asked', (code, kind) => {
		const found = (clearances: Context['clearances']) =>
			grades(judge({ context: { clearances }, activities: [{ code }] }), 'clearance-missing');
		for (const state of ['withheld', 'on-hold', 'withdrawn', 'lapsed'] as const) {
			expect(found([{ kind, state }])).toEqual(['stop during']);
			expect(found([{ kind, state }, kind])).toEqual([]);
		}
		for (const clearances of [undefined, [], [kind], [{ kind, state: 'asked' as const }]]) {
			expect(found(clearances)).toEqual([]);
		}
	});

	it.each(ACTIVITIES.filter(({ clearance }) => clearance === null).map(({ code }) => code))(
		'%s needs none',
		(code) => {
			expect(grades(judge({ activities: [{ code }] }), 'clearance-missing')).toEqual([]);
		}
	);

	// The reference's check of levels: stairs ask for 4 METs, which a patient at level 4 has no clearance for; from memory.
	it.each([[4], [5], [6]] as const)('refuses stairs at level %i until they are cleared', (level) => {
		const stairs = [{ code: 'stairs' as const, helper: true }];
		expect(grades(judge({ context: { level }, activities: stairs }), 'clearance-missing')).toEqual([
			'stop during'
		]);
		const cleared = { level, clearances: ['stairs' as const] };
		expect(grades(judge({ context: cleared, activities: stairs }), 'clearance-missing')).toEqual([]);
	});

	it('asks for the arm stage after a sternotomy only', () => {
		const verdict = judge({ context: { sternotomy: false }, activities: [{ code: 'arm-exercise' }] });
		expect(grades(verdict, 'clearance-missing')).toEqual([]);
	});

	it('is silent about what was planned and not done', () => {
		expect(judge({ activities: [{ code: 'stairs', notDone: true }] }).findings).toEqual([]);
	});

	it('names the activity and the clearance', () => {
		expect(
			only(judge({ activities: [{ code: 'arm-exercise', elevationDeg: 40 }] }), 'clearance-missing')
		).toMatchObject({
			measured: 'arm-exercise',
			reason: 'Arm exercise needs the clearance for the arm stage, and none is in force.'
		});
	});
});

describe('granted', () => {
	it.each([
		[undefined, null],
		[[], null],
		[['stairs' as const], null],
		[['arm-stage' as const], { maxElevationDeg: null, maxLoadKg: null }],
		[[{ kind: 'arm-stage' as const, maxLoadKg: 2 }], { maxElevationDeg: null, maxLoadKg: 2 }],
		[
			[{ kind: 'arm-stage' as const, maxElevationDeg: 80, limits: { maxElevationDeg: 70, maxLoadKg: 1 } }],
			{ maxElevationDeg: 70, maxLoadKg: 1 }
		],
		[[{ kind: 'arm-stage' as const, state: 'withheld' as const }], null],
		[[{ kind: 'arm-stage' as const, state: 'withdrawn' as const }], null],
		[[{ kind: 'arm-stage' as const, state: 'lapsed' as const }], null],
		[[{ kind: 'arm-stage' as const, state: 'given' as const }], { maxElevationDeg: null, maxLoadKg: null }]
	])('%j', (clearances, expected) => {
		expect(granted({ clearances }, 'arm-stage')).toEqual(expected);
	});
});

it('tells which clearance an activity lacks, before anything is recorded', () => {
	const context = {
		clearances: [{ kind: 'corridor' as const, state: 'on-hold' as const }],
		sternotomy: true
	};
	const lacking = ACTIVITIES.map((activity) => [activity.code, lackingClearance(context, activity)]);
	expect(lacking.filter(([, kind]) => kind !== null)).toEqual([
		['self-feeding', 'oral-intake'],
		['hall-walk', 'corridor'],
		['hall-walk-long', 'corridor'],
		['arm-exercise', 'arm-stage'],
		['stairs', 'stairs'],
		['treadmill-walk', 'treadmill']
	]);
});
