import { describe, expect, it } from 'vitest';
import type { Sent } from '$lib/client/sessions';
import { ApiProblem } from '$lib/client/api';
import type { SessionBody } from '$lib/domain/bedside/forms';
import { Recording } from './recording.svelte';
import { BedsideSession } from './session.svelte';
import { draft, RECORD, typed } from './testing';

const NOW = Date.parse('2026-03-03T09:20:00Z');

function open(changes: Parameters<typeof draft>[0] = {}): BedsideSession {
	const session = new BedsideSession(
		() => RECORD,
		'key-1',
		() => NOW
	);
	session.draft = draft(changes);
	return session;
}

/** A server that gives these answers in turn, and what it was sent. */
function answering(...answers: Sent[]) {
	const sent: { body: SessionBody; key: string }[] = [];
	const send = (body: SessionBody, key: string) => {
		sent.push({ body, key });
		const answer = answers.shift();
		return answer ? Promise.resolve(answer) : Promise.reject(new Error('No answer is left.'));
	};
	return { sent, send };
}

const RECORDED: Sent = { kind: 'recorded', recorded: { id: 's1', findings: [], outcome: 'clear' } };
const UNANSWERED: Sent = { kind: 'unanswered' };
const refused = (status: number): Sent => ({
	kind: 'refused',
	problem: new ApiProblem(status, 'x', 'Why.')
});

describe('rising work', () => {
	const stages = (first: string, second: string) =>
		open({
			before: typed({ sbp: '140', dbp: '80', hr: '80' }),
			during: [typed({ sbp: '150', hr: '110', work: first }), typed({ sbp: '138', hr: '96', work: second })]
		}).verdict.findings.map(({ rule, grade }) => `${rule} ${grade}`);

	it.each([
		['1', '2', true],
		['2.5', '3.0', true],
		['2', '2', false],
		['2', '1', false],
		['', '2', false]
	])('from %s to %s: a fall of 12 and 14 is found, %s', (first, second, found) => {
		expect(stages(first, second).includes('systolic-stage-fall stop')).toBe(found);
		expect(stages(first, second).includes('heart-rate-fall stop')).toBe(found);
	});
});

describe('a session while it is typed', () => {
	it.each([
		['a low pressure before', { before: typed({ sbp: '85', dbp: '50' }), after: typed({}) }, 'before'],
		['a fall after effort', { after: typed({ sbp: '108', dbp: '66' }) }, 'now'],
		['a fall in effort, nothing after', { during: [typed({ sbp: '108' })], after: typed({}) }, 'now'],
		['a fall in effort, well after', { during: [typed({ sbp: '108' })] }, 'past'],
		[
			'a fall in effort, dizzy after',
			{ during: [typed({ sbp: '108' })], symptoms: ['dizziness' as const] },
			'now'
		]
	])('%s is a stop of the phase', (_, changes, phase) => {
		const session = open(changes);
		expect(session.stops.length).toBeGreaterThan(0);
		expect(session.stopPhase).toBe(phase);
	});

	it('does not sit the patient down for want of a clearance', () => {
		const arms = {
			code: 'arm-exercise' as const,
			texts: { elevationDeg: '90' },
			confirmed: [],
			helper: false
		};
		const session = open({ activities: [arms] });
		expect(session.verdict.outcome).toBe('stop');
		expect(session.stops).toEqual([]);
		expect(session.findingsAt('activities').map(({ rule }) => rule)).toEqual([
			'arm-elevation',
			'clearance-missing'
		]);
	});

	it('shows a finding beside the reading in effort that it is about, and at no other', () => {
		const session = open({ during: [typed({ sbp: '127' }), typed({ sbp: '108' })] });
		const rules = (index: number) => session.findingsOf({ moment: 'during', index }).map(({ rule }) => rule);
		expect(rules(0)).toEqual([]);
		expect(rules(1)).toEqual(['systolic-fall']);
	});

	it('begins once', () => {
		const session = new BedsideSession(
			() => RECORD,
			'key-1',
			() => NOW
		);
		expect(session.untouched).toBe(true);
		session.begin();
		session.draft.startedAt = NOW - 5;
		session.begin();
		expect(session.draft.startedAt).toBe(NOW - 5);
	});
});

describe('Recording', () => {
	it('records under the key of the session', async () => {
		const session = open();
		const { sent, send } = answering(RECORDED);
		const recording = new Recording(session, send);
		await expect(recording.send()).resolves.toMatchObject({ id: 's1' });
		expect(sent[0]).toMatchObject({ key: 'key-1', body: { level: 4 } });
	});

	it('sends the very same again while no answer has come', async () => {
		const session = open();
		const { sent, send } = answering(UNANSWERED, refused(401), UNANSWERED, RECORDED);
		const recording = new Recording(session, send);
		await recording.send();
		expect(session.draft.sent?.at).toBe(NOW);
		session.draft.after.texts.sbp = '90';
		await recording.send();
		expect(recording.problem?.signIn).toBe(true);
		await recording.send();
		await recording.send();
		expect(recording.recorded?.id).toBe('s1');
		expect(new Set(sent.map(({ key }) => key))).toEqual(new Set(['key-1']));
		expect(sent.slice(1).every(({ body }) => JSON.stringify(body) === JSON.stringify(sent[0]?.body))).toBe(
			true
		);
	});

	it('lets a refused session be changed, and keeps its key', async () => {
		const session = open();
		const { sent, send } = answering(UNANSWERED, refused(422), RECORDED);
		const recording = new Recording(session, send);
		await recording.send();
		await recording.send();
		expect(session.draft.sent).toBeNull();
		expect(recording.problem?.text).toBe('Why.');
		session.draft.after.texts.sbp = '124';
		await recording.send();
		expect(recording.problem).toBeNull();
		expect(sent[2]).toMatchObject({ key: 'key-1', body: { after: { sbp: 124 } } });
	});

	it('names the clearances that are needed', async () => {
		const { send } = answering({ kind: 'clearance-needed', kinds: ['arm-stage'] });
		const recording = new Recording(open(), send);
		await expect(recording.send()).resolves.toBeNull();
		expect(recording.needed).toEqual(['arm-stage']);
	});

	it('does not send twice at once', async () => {
		const { sent, send } = answering(RECORDED);
		const recording = new Recording(open(), send);
		await Promise.all([recording.send(), recording.send()]);
		expect(sent).toHaveLength(1);
	});

	it('is held before it leaves, so that a reload on the way sends the very same', async () => {
		const session = open();
		const kept: unknown[] = [];
		const recording = new Recording(session, () => {
			kept.push(session.draft.sent?.body);
			return Promise.resolve(RECORDED);
		});
		await recording.send();
		expect(kept).toEqual([expect.objectContaining({ level: 4 })]);
	});

	it('does not say that it was not sent while the first try is under way', async () => {
		let answer = (_: Sent): void => {};
		const recording = new Recording(open(), () => new Promise((resolve) => (answer = resolve)));
		const sending = recording.send();
		expect(recording).toMatchObject({ pending: true, unanswered: false });
		answer(UNANSWERED);
		await sending;
		expect(recording).toMatchObject({ pending: false, unanswered: true });
	});

	it('that was on its way when the page went is sent again as it was, and is then recorded', async () => {
		const body = { level: 3 } as SessionBody;
		const session = open({ sent: { body, at: NOW - 60_000 } });
		const { sent, send } = answering(RECORDED);
		const recording = new Recording(session, send);
		await recording.send();
		expect(sent).toEqual([{ body, key: 'key-1' }]);
		expect(recording).toMatchObject({ unanswered: false, recorded: { id: 's1' } });
	});

	it.each([
		['a first try', [refused(401)], false],
		['a try after one without an answer', [UNANSWERED, refused(401)], true],
		['a try after one without an answer, too many requests', [UNANSWERED, refused(429)], true],
		['a try after one without an answer, for good', [UNANSWERED, refused(422)], false]
	])('refused: %s', async (_, answers, held) => {
		const session = open();
		const { send } = answering(...answers);
		const recording = new Recording(session, send);
		for (let n = 0; n < answers.length; n += 1) {
			await recording.send();
		}
		expect(session.draft.sent !== null).toBe(held);
		expect(recording.unanswered).toBe(held);
	});
});
