import { describe, expect, it } from 'vitest';
import type { Context } from '../forms';
import { grades, judge, only } from '../testing/sample';

const lift = (
	elevationDeg: number | undefined,
	context: Partial<Context> = {},
	code: 'active-arms' | 'passive-arms' | 'arm-exercise' = 'active-arms'
) => judge({ context, activities: [{ code, elevationDeg }] });

describe('arm-elevation', () => {
	it.each<[string, Partial<Context>, number, string[]]>([
		['not cleared', {}, 45, []],
		['not cleared', {}, 45.1, ['stop during']],
		['clearances not stated', { clearances: undefined }, 45.1, ['stop during']],
		['another clearance', { clearances: ['stairs'] }, 45.1, ['stop during']],
		['cleared, no limit stated', { clearances: ['arm-stage'] }, 90, []],
		['cleared, no limit stated', { clearances: ['arm-stage'] }, 90.1, ['stop during']],
		['cleared to 70', { clearances: [{ kind: 'arm-stage', maxElevationDeg: 70 }] }, 70, []],
		['cleared to 70', { clearances: [{ kind: 'arm-stage', maxElevationDeg: 70 }] }, 70.1, ['stop during']],
		[
			'cleared to 70 on record',
			{ clearances: [{ kind: 'arm-stage', state: 'given-with-limits', limits: { maxElevationDeg: 70 } }] },
			71,
			['stop during']
		],
		['cleared to 120', { clearances: [{ kind: 'arm-stage', maxElevationDeg: 120 }] }, 120, []],
		['cleared below 45', { clearances: [{ kind: 'arm-stage', maxElevationDeg: 30 }] }, 31, ['stop during']],
		[
			'cleared twice, the narrower holds',
			{ clearances: ['arm-stage', { kind: 'arm-stage', maxElevationDeg: 60 }] },
			61,
			['stop during']
		],
		['asked only', { clearances: [{ kind: 'arm-stage', state: 'asked' }] }, 46, ['stop during']],
		['on hold', { clearances: [{ kind: 'arm-stage', state: 'on-hold' }] }, 46, ['stop during']],
		[
			'a limit beside the bare kind',
			{ clearances: ['arm-stage'], limits: { maxElevationDeg: 70 } },
			71,
			['stop during']
		],
		[
			'cleared to 90, narrower for the patient',
			{ clearances: [{ kind: 'arm-stage', maxElevationDeg: 90 }], limits: { 'arm-elevation.cleared': 60 } },
			61,
			['stop during']
		],
		['a limit of the patient before clearance', { limits: { 'arm-elevation': 30 } }, 31, ['stop during']],
		['no sternotomy', { sternotomy: false }, 180, []]
	])('%s, %o: %d degrees', (_what, context, degrees, found) => {
		expect(grades(lift(degrees, context), 'arm-elevation')).toEqual(found);
		expect(grades(lift(degrees, context, 'passive-arms'), 'arm-elevation')).toEqual(found);
	});

	it('names the limit and why it is that', () => {
		expect(only(lift(80), 'arm-elevation')).toMatchObject({
			grade: 'stop',
			measured: 80,
			limit: 45,
			unit: 'degrees',
			reason:
				'Small arm movements: an arm was lifted to 80 degrees, over the limit of 45 until the arm stage is cleared.',
			source: 'common practice, no published source'
		});
		const cleared = lift(80, { clearances: [{ kind: 'arm-stage', maxElevationDeg: 70 }] });
		expect(only(cleared, 'arm-elevation')).toMatchObject({ limit: 70, source: 'limit of the clearance' });
	});

	it('is unjudged when the height of an arm activity was not recorded', () => {
		expect(lift(undefined).notJudged).toContain('arm-elevation');
		expect(lift(undefined, { sternotomy: false }).notJudged).not.toContain('arm-elevation');
		expect(judge({ activities: [{ code: 'ankle-pumps' }] }).notJudged).not.toContain('arm-elevation');
	});

	it('is silent about what was planned and not done', () => {
		const verdict = judge({ activities: [{ code: 'active-arms', elevationDeg: 120, notDone: true }] });
		expect(verdict.findings).toEqual([]);
	});
});
