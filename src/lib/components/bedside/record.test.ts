import { describe, expect, it } from 'vitest';
import type { ClearanceLine, Nameboard } from '$lib/domain/episodes/views';
import { newestOf, recordOf } from './record';

const LINE: ClearanceLine = {
	id: 'c1',
	kind: 'arm-stage',
	state: 'given-with-limits',
	question: 'May the arm stage start?',
	askedBy: 'Iris',
	askedAt: '2026-03-02T09:00:00Z',
	decidedBy: 'Orla',
	decidedAt: '2026-03-02T10:00:00Z',
	limits: { maxElevationDeg: 90 },
	reviewOn: null,
	note: null,
	reason: null,
	current: true
};

const NO_LOAD = { maxLoadKg: null, armStage: null };
const BOARD: Pick<
	Nameboard,
	| 'level'
	| 'phase'
	| 'betaBlocked'
	| 'rhythm'
	| 'operatedAt'
	| 'precautions'
	| 'clearances'
	| 'limits'
	| 'wordings'
> = {
	level: 4,
	phase: 'inpatient',
	betaBlocked: true,
	rhythm: 'sinus',
	operatedAt: '2026-02-27T08:00:00Z',
	precautions: { basis: 'performed', sternal: true, endDue: '2026-04-24', maxElevationDeg: 90, ...NO_LOAD },
	clearances: [LINE],
	limits: { unit: [], patient: [] },
	wordings: []
};

const TODAY = '2026-03-03';

describe('recordOf', () => {
	it('judges by the set and the limits of the unit, and by those of the patient over them', () => {
		const agreed = { agreedBy: 'Maeve Tidewell', agreedOn: '2026-02-02' };
		const unit = [
			{ version: 1, set: 'guideline', key: null, value: null, ...agreed },
			{ version: 2, set: 'guideline', key: 'systolic-fall', value: 15, ...agreed }
		] as const;
		const own = { version: 1, key: 'pain-ceiling', value: 5, setBy: 'Orla', untilOn: TODAY } as const;
		const { limits } = recordOf({ ...BOARD, limits: { unit, patient: [own] } }, TODAY);
		expect(limits.version).toBe('guideline/2+unit 2+patient 1');
		expect(limits.limits['systolic-fall']?.value).toBe(15);
		expect(limits.limits['pain-ceiling']?.value).toBe(5);
	});

	it('hands on the limit of a clearance in force', () => {
		expect(recordOf(BOARD, TODAY).clearances).toEqual([
			{ kind: 'arm-stage', state: 'given-with-limits', maxElevationDeg: 90, maxLoadKg: null }
		]);
	});

	it.each([
		['2026-03-04', 'given-with-limits'],
		['2026-03-03', 'given-with-limits'],
		['2026-03-02', 'lapsed']
	])('with a review on %s it is %s', (reviewOn, state) => {
		const [clearance] = recordOf({ ...BOARD, clearances: [{ ...LINE, reviewOn }] }, TODAY).clearances;
		expect(clearance).toMatchObject({ state });
	});

	it('looks at the newest of each kind, and at none from before the latest operation', () => {
		const clearances = [
			{ ...LINE, id: 'c3', state: 'on-hold' as const },
			{ ...LINE, id: 'c2' },
			{ ...LINE, id: 'c0', kind: 'stairs' as const, state: 'given' as const, current: false }
		];
		expect(recordOf({ ...BOARD, clearances }, TODAY).clearances).toMatchObject([
			{ kind: 'arm-stage', state: 'on-hold' }
		]);
		expect(newestOf(clearances, 'stairs')).toBeNull();
	});

	it('keeps the precautions where no operation is on record, and drops them where they were ended', () => {
		const ended = {
			basis: 'performed',
			sternal: false,
			endDue: null,
			maxElevationDeg: null,
			...NO_LOAD
		} as const;
		const none = { ...ended, basis: 'none' } as const;
		expect(recordOf({ ...BOARD, operatedAt: null, precautions: none }, TODAY).sternotomy).toBe(true);
		expect(recordOf({ ...BOARD, precautions: ended }, TODAY).sternotomy).toBe(false);
	});

	it('takes a level that is none for the most careful one', () => {
		expect(recordOf({ ...BOARD, level: 9 }, TODAY).level).toBe(1);
	});
});
