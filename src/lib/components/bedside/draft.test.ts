import { describe, expect, it } from 'vitest';
import { measureAgain, newDraft, readDraft } from './draft';
import { draft, RECORD, typed } from './testing';

describe('newDraft', () => {
	it.each([true, false, null])(
		'answers nothing that is asked each time, with the drug on record as %s',
		(betaBlocked) => {
			expect(newDraft({ ...RECORD, betaBlocked, rhythm: 'sinus' }, 'k')).toMatchObject({
				level: RECORD.level,
				drug: null,
				responds: null,
				rhythm: null,
				startChecks: [],
				noStartChecks: false,
				startedAt: null
			});
		}
	);
});

describe('readDraft', () => {
	it('brings back what was kept', () => {
		const kept = draft({ symptoms: ['dizziness'] });
		expect(readDraft(JSON.stringify(kept))).toEqual(kept);
	});

	it.each([[null], ['null'], ['{'], ['{"version":0}'], ['[]']])('takes %j for nothing', (kept) => {
		expect(readDraft(kept)).toBeNull();
	});
});

describe('measureAgain', () => {
	it('keeps the reading after effort as one in effort, and makes room sitting', () => {
		const session = draft();
		const stopped = session.after;
		expect(measureAgain(session)).toEqual({ moment: 'after' });
		expect(session.during).toEqual([stopped]);
		expect(session.after).toMatchObject({ texts: {}, posture: 'sitting' });
	});

	it('leads to an empty reading after effort without moving anything', () => {
		const session = draft({ during: [typed({ sbp: '110' })], after: typed({}) });
		expect(measureAgain(session)).toEqual({ moment: 'after' });
		expect(session.during).toHaveLength(1);
	});

	it('types the reading before anew while nothing was begun', () => {
		const session = draft({ before: typed({ sbp: '85' }), after: typed({ sbp: ' ' }) });
		expect(measureAgain(session)).toEqual({ moment: 'before' });
		expect(session.before.texts.sbp).toBe('85');
	});
});
