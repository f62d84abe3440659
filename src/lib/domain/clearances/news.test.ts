import { describe, expect, it } from 'vitest';
import { marksOf, newsSince, type EvidenceNews } from './news';
import type { ShownEvidence } from './views';

const SESSION = { id: 's1', startedAt: '2026-03-02T10:00:00.000Z', outcome: 'clear' as const, findings: [] };
const CALL = {
	id: 'e1',
	grade: 'high',
	state: 'raised',
	situation: 'Short of breath.',
	raisedAt: '2026-03-02T11:00:00.000Z'
} as const;
const WOUND = {
	at: '2026-03-02T08:00:00.000Z',
	by: 'Nurse',
	wound: 'dry',
	sternum: null,
	note: null
} as const;
const OXYGEN = { lpm: 2, at: '2026-03-02T08:00:00.000Z', by: 'Nurse' };
const PRECAUTIONS = {
	basis: 'performed',
	sternal: true,
	endDue: '2026-04-26',
	maxElevationDeg: 45,
	maxLoadKg: null,
	armStage: null
} as const;

const SHOWN: ShownEvidence = {
	at: '2026-03-02T12:00:00.000Z',
	procedure: 'Bypass: three | vessels',
	approach: 'sternotomy',
	operatedOn: '2026-03-01',
	postOpDay: 1,
	level: 2,
	betaBlocked: true,
	rhythm: 'sinus',
	wound: WOUND,
	lines: ['arterial-line', 'chest-drain'],
	oxygen: OXYGEN,
	precautions: PRECAUTIONS,
	sessions: [SESSION],
	escalations: [CALL]
};
const news = (more: Partial<EvidenceNews>) => ({ sessions: 0, escalations: 0, changed: [], ...more });

describe('newsSince', () => {
	it.each<[string, Partial<ShownEvidence>, EvidenceNews | null]>([
		['nothing', {}, null],
		['only the clock and midnight', { at: '2026-03-03T00:00:00.000Z', postOpDay: 2 }, null],
		['a session', { sessions: [{ ...SESSION, id: 's2' }, SESSION] }, news({ sessions: 1 })],
		[
			'an amended session',
			{ sessions: [{ ...SESSION, amendments: ['96, not 69.'] }] },
			news({ sessions: 1 })
		],
		['a session that no longer is among the last', { sessions: [] }, null],
		['a call for help', { escalations: [{ ...CALL, id: 'e2' }, CALL] }, news({ escalations: 1 })],
		['a call that somebody took', { escalations: [{ ...CALL, state: 'taken' }] }, null],
		['a call that was settled', { escalations: [{ ...CALL, state: 'settled' }] }, news({ escalations: 1 })],
		['a wound', { wound: { ...WOUND, at: '2026-03-02T12:01:00.000Z' } }, news({ changed: ['wound'] })],
		['a drain that is out', { lines: ['arterial-line'] }, news({ changed: ['lines'] })],
		['more oxygen', { oxygen: { ...OXYGEN, lpm: 4 } }, news({ changed: ['oxygen'] })],
		['the same oxygen, said again', { oxygen: { ...OXYGEN, at: '2026-03-02T12:01:00.000Z' } }, null],
		['a level', { level: 1 }, news({ changed: ['level'] })],
		['a rhythm', { rhythm: 'atrial-fibrillation' }, news({ changed: ['heart'] })],
		['a drug that is no longer known', { betaBlocked: null }, news({ changed: ['heart'] })],
		['a return to theatre', { operatedOn: '2026-03-02' }, news({ changed: ['operation'] })],
		[
			'arms that may go up',
			{ precautions: { ...PRECAUTIONS, maxElevationDeg: 90 } },
			news({ changed: ['precautions'] })
		],
		[
			'a load that may be lifted',
			{ precautions: { ...PRECAUTIONS, maxLoadKg: 2 } },
			news({ changed: ['precautions'] })
		],
		['what this person may not see', { sessions: null, escalations: null }, null]
	])('with %s', (_, more, expected) => {
		expect(newsSince(marksOf(SHOWN), { ...SHOWN, ...more })).toEqual(expected);
	});

	it('takes everything for new where nothing was shown', () => {
		expect(newsSince('', SHOWN)).toMatchObject({ sessions: 1, escalations: 1 });
	});
});
