import { describe, expect, it } from 'vitest';
import type { Finding } from '../bedside/finding';
import { judge } from '../bedside/testing/sample';
import { draftEscalation, PART_MAX, readingWords, type DraftRecord, type DraftSession } from './draft';

const RECORD: DraftRecord = {
	procedure: 'Coronary artery bypass',
	approach: 'sternotomy',
	postOpDay: 4,
	level: 4,
	betaBlocked: true,
	rhythm: 'sinus',
	maxElevationDeg: 45
};

const ZONE = 'Europe/Dublin';

/** A walk in winter, when the clock of the hospital shows UTC. */
const CLEAR: DraftSession = {
	startedAt: '2026-03-03T14:02:10Z',
	endedAt: '2026-03-03T14:11:50Z',
	level: 4,
	outcome: 'clear',
	activities: [{ code: 'hall-walk', name: 'Walking in the corridor' }],
	before: { posture: 'sitting', sbp: 128, dbp: 74, hr: 76, spo2: 96 },
	during: [],
	after: { posture: 'sitting', sbp: 126, dbp: 72, hr: 84, spo2: 95, rpe: 11 },
	findings: []
};

/** The same walk, judged by the rules themselves. */
function walked(after: DraftSession['after'], symptoms: 'dizziness'[] = []): DraftSession {
	const { before } = CLEAR;
	const { findings, outcome } = judge({ before, during: [], after, symptoms });
	return { ...CLEAR, after, findings, outcome };
}

describe('draftEscalation', () => {
	it('tells a fall in the words of its finding, with the readings below', () => {
		const draft = draftEscalation(RECORD, walked({ posture: 'sitting', sbp: 108, dbp: 66, hr: 86 }), ZONE);
		expect(draft.grade).toBe('high');
		expect(draft.situation).toBe(
			'Walking in the corridor, level 4, 14:02 to 14:11. The systolic pressure fell by 20 mmHg, from 128 before the session to 108 after effort: more than the limit of 10.'
		);
		expect(draft.assessment).toContain('Before: sitting, 128/74 mmHg, pulse 76, saturation 96 %.');
		expect(draft.assessment).toContain('After: sitting, 108/66 mmHg, pulse 86.');
		expect(draft.request).toBe('Please come to the bedside now.');
	});

	it('says of a stop before the start that nothing was begun, and misses nothing of effort', () => {
		const before = { posture: 'sitting', sbp: 128, dbp: 74, hr: 140 } as const;
		const { findings, outcome } = judge({ before, during: [], after: { hr: null, sbp: null, dbp: null } });
		const barred = { ...CLEAR, before, after: {}, findings, outcome };
		const { situation, assessment } = draftEscalation(RECORD, barred, ZONE);
		expect(situation).toMatch(/^Not begun: walking in the corridor, level 4/);
		expect(assessment).toBe('Before: sitting, 128/74 mmHg, pulse 140.');
	});

	it('says each symptom in the situation', () => {
		const { after } = CLEAR;
		const draft = draftEscalation(RECORD, walked(after, ['dizziness']), ZONE);
		expect(draft.situation).toContain('The patient has dizziness');
	});

	it('says what was not measured, and repeats no note that the background holds', () => {
		const { before, after } = CLEAR;
		const { findings, outcome } = judge({
			context: { betaBlocked: null },
			before,
			during: [],
			after: { ...after, hr: null }
		});
		const { assessment } = draftEscalation(RECORD, { ...CLEAR, findings, outcome }, ZONE);
		expect(assessment).toContain('The heart rate after effort was not measured.');
		expect(assessment).not.toContain('judged as if so');
	});

	it('gives the background from the record', () => {
		expect(draftEscalation(RECORD, null, ZONE).background).toBe(
			'Coronary artery bypass by sternotomy, day 4. Level 4. On a rate-slowing drug. Rhythm: sinus. Arms to 45 degrees.'
		);
	});

	it('says what the record does not know, and leaves out what it does not have', () => {
		const bare = { ...RECORD, procedure: null, betaBlocked: null, rhythm: null, maxElevationDeg: null };
		expect(draftEscalation(bare, null, ZONE).background).toBe(
			'Level 4. Rate-slowing drug not known. Rhythm not known.'
		);
	});

	it('proposes nothing where no session is given', () => {
		expect(draftEscalation(RECORD, null, ZONE)).toMatchObject({
			grade: null,
			situation: '',
			assessment: '',
			request: ''
		});
	});

	it('takes the clock of the hospital, summer time included', () => {
		const summer = { ...CLEAR, startedAt: '2026-07-03T14:02:10Z', endedAt: '2026-07-03T14:02:40Z' };
		expect(draftEscalation(RECORD, summer, ZONE).situation).toBe(
			'Walking in the corridor, level 4, at 15:02.'
		);
	});

	it.each<[string, DraftSession['outcome'], Pick<Finding, 'rule' | 'grade'>[], string]>([
		['an answer of the patient that stops', 'stop', [{ rule: 'systolic-fall', grade: 'stop' }], 'high'],
		['a deed without its clearance', 'stop', [{ rule: 'clearance-missing', grade: 'stop' }], 'medium'],
		['a caution', 'caution', [{ rule: 'systolic-fall', grade: 'caution' }], 'medium'],
		['a missing reading', 'incomplete', [{ rule: 'reading-missing', grade: 'note' }], 'medium'],
		['nothing found', 'clear', [], 'low']
	])('grades %s', (_, outcome, found, grade) => {
		const findings = found.map((finding) => ({
			...finding,
			reading: 'after' as const,
			measured: null,
			limit: null,
			unit: null,
			reason: 'A reason.',
			source: 'A source.',
			set: 'strict' as const,
			version: '1'
		}));
		expect(draftEscalation(RECORD, { ...CLEAR, outcome, findings }, ZONE).grade).toBe(grade);
	});

	it('stays within what a call may hold, at the end of a sentence', () => {
		const during = Array.from({ length: 60 }, () => CLEAR.after);
		const { assessment } = draftEscalation(RECORD, { ...CLEAR, during }, ZONE);
		expect(assessment.length).toBeLessThanOrEqual(PART_MAX);
		expect(assessment).toMatch(/exertion 11 of 20\. More in the session\.$/);
	});
});

describe('readingWords', () => {
	it.each([
		[{}, 'not measured'],
		[{ posture: 'lying' as const }, 'not measured'],
		[{ sbp: 108 }, '108/– mmHg'],
		[{ hr: 86.5, pain: 0 }, 'pulse 86.5, pain 0 of 10']
	])('says %j', (reading, words) => {
		expect(readingWords(reading)).toBe(words);
	});
});
