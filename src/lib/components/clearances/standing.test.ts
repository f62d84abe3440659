import { describe, expect, it } from 'vitest';
import type { ClearanceKind, ClearanceState } from '$lib/domain/core/codes';
import type { ClearanceLine } from '$lib/domain/episodes/views';
import { askable, byKind, standingOf, unaskedWords, type Judged } from './standing';

const TODAY = '2026-03-03';

function line(state: ClearanceState, more: Partial<ClearanceLine> = {}): ClearanceLine {
	return {
		id: 'c1',
		kind: 'arm-stage',
		state,
		question: 'May it start?',
		askedBy: 'I. Aldous',
		askedAt: '2026-03-02T10:02:00.000Z',
		decidedBy: null,
		decidedAt: null,
		limits: null,
		reviewOn: null,
		note: null,
		reason: null,
		current: true,
		...more
	};
}

const standing = (of: ClearanceLine | null, more: Partial<Judged> = {}) =>
	standingOf({ kind: 'arm-stage', line: of, sternal: true, today: TODAY, ...more });

describe('standingOf', () => {
	it.each<[ClearanceState, string, string | null]>([
		['asked', 'not-cleared', 'asked, not decided'],
		['given', 'cleared', null],
		['given-with-limits', 'cleared-with-limits', null],
		['withheld', 'not-cleared', 'refused'],
		['on-hold', 'not-cleared', 'on hold'],
		['withdrawn', 'not-cleared', 'withdrawn'],
		['lapsed', 'not-cleared', 'lapsed']
	])('%s reads %s, %s', (state, headline, why) => {
		expect(standing(line(state))).toEqual({ headline, why });
	});

	it.each([
		['2026-03-02', 'not-cleared'],
		['2026-03-03', 'cleared'],
		['2026-03-04', 'cleared']
	])('given until the review of %s is %s', (reviewOn, headline) => {
		expect(standing(line('given', { reviewOn })).headline).toBe(headline);
	});

	it('permits nothing that an earlier operation left behind', () => {
		expect(standing(line('given', { current: false }))).toEqual({
			headline: 'not-cleared',
			why: 'asked before the latest operation'
		});
	});

	it('says that nobody has asked', () => {
		expect(standing(null)).toEqual({ headline: 'not-cleared', why: 'not yet asked' });
	});

	it.each<[ClearanceState | null, string | null, string]>([
		[null, null, 'as the level allows'],
		['asked', null, 'as the level allows · asked, not decided'],
		['given', 'cleared', ''],
		['withheld', 'not-cleared', 'refused'],
		['on-hold', 'not-cleared', 'on hold'],
		['lapsed', 'not-cleared', 'lapsed']
	])('the corridor, %s, follows the level until somebody has decided: %s %s', (state, headline, why) => {
		const asked = state === null ? null : line(state, { kind: 'corridor' });
		expect(standing(asked, { kind: 'corridor' })).toEqual({ headline, why: why || null });
	});

	it.each<[ClearanceState | null, string | null, string]>([
		['withheld', 'not-cleared', 'refused · asked, not decided'],
		['on-hold', 'not-cleared', 'on hold · asked, not decided'],
		['lapsed', 'not-cleared', 'lapsed · asked, not decided'],
		['given', null, 'as the level allows · asked, not decided'],
		[null, null, 'as the level allows · asked, not decided']
	])('asking again after %s opens no door: %s %s', (before, headline, why) => {
		const asked = line('asked', { kind: 'corridor' });
		expect(standing(asked, { kind: 'corridor', before })).toEqual({ headline, why });
	});

	it.each<[ClearanceKind, string | null]>([
		['arm-stage', null],
		['precautions-end', null],
		['stairs', 'not-cleared'],
		['treadmill', 'not-cleared']
	])('without sternal precautions nobody need clear %s: %s', (kind, headline) => {
		expect(standing(null, { kind, sternal: false }).headline).toBe(headline);
	});
});

describe('byKind', () => {
	it('takes the newest ask of each kind and keeps the others as history', () => {
		const [newest, older, stairs] = [
			line('asked', { id: 'c3' }),
			line('withheld', { id: 'c2' }),
			line('given', { id: 'c1', kind: 'stairs' })
		];
		const kinds = byKind([newest, older, stairs]);
		expect(kinds).toHaveLength(8);
		expect(kinds[0]).toEqual({ kind: 'arm-stage', newest, earlier: [older], before: 'withheld' });
		expect(kinds.find(({ kind }) => kind === 'stairs')).toEqual({
			kind: 'stairs',
			newest: stairs,
			earlier: [],
			before: null
		});
		expect(kinds.find(({ kind }) => kind === 'treadmill')).toEqual({
			kind: 'treadmill',
			newest: null,
			earlier: [],
			before: null
		});
	});

	it('passes by an ask that was taken back before anybody decided', () => {
		const back = line('withdrawn', { id: 'c2' });
		const asked = line('given', { id: 'c1', decidedBy: 'H. Castellane' });
		expect(byKind([back])[0]).toMatchObject({ newest: null, earlier: [back] });
		expect(byKind([back, asked])[0]).toMatchObject({ newest: asked, earlier: [back] });
		const decided = line('withdrawn', { decidedBy: 'H. Castellane' });
		expect(byKind([decided])[0]).toMatchObject({ newest: decided, earlier: [] });
	});
});

describe('unaskedWords', () => {
	it('says of each what decides, as the page of the clearances and the nameboard do', () => {
		expect(unaskedWords(['arm-stage', 'out-of-bed', 'corridor', 'stairs'], true, TODAY)).toEqual([
			'Not cleared, not yet asked: arm stage and stairs',
			'As the level allows: out of bed and corridor'
		]);
	});
});

describe('askable', () => {
	it.each<[string, ClearanceLine, boolean]>([
		['asked', line('asked'), false],
		['given', line('given'), false],
		['given with limits', line('given-with-limits'), false],
		['on hold', line('on-hold'), false],
		['withheld', line('withheld'), true],
		['withdrawn', line('withdrawn'), true],
		['lapsed', line('lapsed'), true],
		['given, its review today', line('given', { reviewOn: '2026-03-03' }), false],
		['given, its review yesterday', line('given', { reviewOn: '2026-03-02' }), true],
		['given before the latest operation', line('given', { current: false }), true]
	])('a kind that is %s: %s', (_, given, expected) => {
		const kind: ClearanceKind = 'arm-stage';
		expect(askable([given], TODAY).includes(kind)).toBe(expected);
	});

	it('is every kind where nobody has asked', () => {
		expect(askable([], TODAY)).toHaveLength(8);
	});
});
