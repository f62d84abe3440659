import { describe, expect, it } from 'vitest';
import { activityByCode } from '$lib/domain/bedside/activities/activities';
import { assess } from '$lib/domain/bedside/assess';
import { sessionBody } from '$lib/domain/bedside/forms';
import { doseFieldsOf, lackingOf, toAssessment, toBody, toReading } from './assessment';
import type { DraftActivity } from './draft';
import { draft, RECORD, typed } from './testing';

const NOW = Date.parse('2026-03-03T09:20:00Z');

function done(code: DraftActivity['code'], texts: DraftActivity['texts'] = {}): DraftActivity {
	return { code, texts, confirmed: [], helper: false };
}

describe('a rhythm that is not the one on record', () => {
	const other = (rhythmKnown: boolean | null) => draft({ rhythm: 'atrial-fibrillation', rhythmKnown });
	const barred = (session: ReturnType<typeof draft>) =>
		assess(toAssessment(session, RECORD)).findings.filter(({ rule }) => rule === 'new-rhythm');

	it.each([null, false])('bars the start until somebody says that it was known: %s', (known) => {
		expect(barred(other(known))).toMatchObject([{ grade: 'stop', reading: 'before' }]);
		expect(toBody(other(known), RECORD, NOW)).toMatchObject({
			context: { rhythm: 'sinus' },
			before: { rhythm: 'atrial-fibrillation' }
		});
	});

	it('bars nothing once it was known, and the caveat stands', () => {
		const { context, before } = toAssessment(other(true), RECORD);
		expect([context.rhythm, before.rhythm]).toEqual(['atrial-fibrillation', undefined]);
		expect(barred(other(true))).toEqual([]);
	});

	it('is none where the record says nothing, or the same', () => {
		expect(barred(draft({ rhythm: 'sinus' }))).toEqual([]);
		const unknown = { ...RECORD, rhythm: null };
		expect(toAssessment(other(null), unknown).context.rhythm).toBe('atrial-fibrillation');
	});
});

describe('toReading', () => {
	it('leaves out what cannot be true and what is no number', () => {
		expect(toReading(typed({ sbp: '12', hr: '8o', spo2: '96', dbp: ' ' }))).toEqual({ spo2: 96 });
	});

	it.each([
		['120', '121', {}],
		['120', '120', {}],
		['121', '120', { sbp: 121, dbp: 120 }]
	])('judges %s over %s as %j', (sbp, dbp, values) => {
		expect(toReading(typed({ sbp, dbp }))).toEqual(values);
	});

	it('says posture, source, rhythm, rest and time where they are known', () => {
		const reading = typed(
			{ hr: '80' },
			{ posture: 'standing', bpSource: 'cuff', rhythm: 'paced', settled: true, at: NOW }
		);
		expect(toReading(reading)).toEqual({
			hr: 80,
			posture: 'standing',
			bpSource: 'cuff',
			rhythm: 'paced',
			settled: true,
			at: '2026-03-03T09:20:00.000Z'
		});
	});
});

describe('doseFieldsOf', () => {
	it.each([
		['arm-exercise', ['elevationDeg', 'repetitions']],
		['passive-arms', ['elevationDeg', 'repetitions']],
		['hall-walk', ['distanceM', 'minutes']],
		['stairs', ['steps']],
		['chair-sitting', ['minutes']],
		['ankle-pumps', ['repetitions']],
		['incentive-spirometer', ['balls', 'repetitions']],
		['self-feeding', []]
	] as const)('%s asks for %j', (code, fields) => {
		expect(doseFieldsOf(activityByCode(code))).toEqual(fields);
	});
});

describe('toAssessment', () => {
	it.each([
		['yes', true],
		['no', false],
		['unknown', null],
		[null, null]
	] as const)('the drug %j is judged as %j', (drug, betaBlocked) => {
		expect(toAssessment(draft({ drug }), RECORD).context.betaBlocked).toBe(betaBlocked);
	});

	it.each([
		['follows', { conscious: true, followsCommands: true }],
		['awake', { conscious: true, followsCommands: false }],
		['unconscious', { conscious: false, followsCommands: false }],
		[null, { conscious: true, followsCommands: null }]
	] as const)('a patient who %j', (responds, facts) => {
		expect(toAssessment(draft({ responds }), RECORD).context).toMatchObject(facts);
	});

	it('says no to a start check only where somebody looked', () => {
		const unasked = toAssessment(draft(), RECORD).context;
		const looked = toAssessment(draft({ noStartChecks: true }), RECORD).context;
		const pumped = toAssessment(draft({ startChecks: ['balloonPump'] }), RECORD).context;
		expect([unasked.balloonPump, looked.balloonPump, pumped.balloonPump]).toEqual([null, false, true]);
		expect(pumped.bleeding).toBeNull();
	});

	it('gives breathlessness its grade, and other symptoms none', () => {
		const { symptoms } = toAssessment(
			draft({ symptoms: ['nausea', 'breathlessness'], breathlessness: 3 }),
			RECORD
		);
		expect(symptoms).toEqual(['nausea', { code: 'breathlessness', grade: 3 }]);
	});

	it('counts a helper on the stairs and nowhere else', () => {
		const helped = { ...done('stairs', { steps: '12' }), helper: true };
		const { activities } = toAssessment(draft({ activities: [helped, done('hall-walk')] }), RECORD);
		expect(activities).toEqual([{ code: 'stairs', steps: 12, helper: true }, { code: 'hall-walk' }]);
	});

	it('answers the same as the server would', () => {
		const session = draft({ after: typed({ sbp: '108', dbp: '66', hr: '86' }) });
		const stored = sessionBody.parse(JSON.parse(JSON.stringify(toBody(session, RECORD, NOW))));
		expect(assess(toAssessment(session, RECORD))).toEqual(assess(stored));
		expect(assess(stored).outcome).toBe('stop');
	});
});

describe('lackingOf', () => {
	it('names each missing clearance once, and none that is given', () => {
		const activities = [done('arm-exercise'), done('stairs'), done('hall-walk')];
		expect(lackingOf({ activities }, RECORD)).toEqual(['arm-stage', 'stairs']);
		const cleared = { ...RECORD, clearances: [{ kind: 'arm-stage' as const, state: 'given' as const }] };
		expect(lackingOf({ activities }, cleared)).toEqual(['stairs']);
	});
});

describe('toBody', () => {
	it('is taken by the schema of the API', () => {
		const session = draft({
			activities: [done('hall-walk', { distanceM: '150' })],
			during: [typed({ hr: '90', rpe: '12' })],
			temperature: '36,8'
		});
		const body = toBody(session, RECORD, NOW);
		expect(sessionBody.safeParse(body).success).toBe(true);
		expect(body).toMatchObject({
			level: 4,
			startedAt: '2026-03-03T09:00:00.000Z',
			endedAt: '2026-03-03T09:20:00.000Z'
		});
	});

	it('never begins after its end', () => {
		const body = toBody(draft({ startedAt: NOW + 1 }), RECORD, NOW);
		expect(body.startedAt).toBe(body.endedAt);
	});

	it('carries a reason only where a clearance is missing', () => {
		const deviation = { reason: 'He lifted them himself.', verbalFrom: ' ', readBack: false };
		const arms = draft({ deviation, activities: [done('arm-exercise', { elevationDeg: '80' })] });
		expect(toBody(arms, RECORD, NOW).deviation).toEqual({ ...deviation, verbalFrom: null });
		expect(toBody(draft({ deviation }), RECORD, NOW).deviation).toBeNull();
	});
});
