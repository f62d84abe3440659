import { describe, expect, it } from 'vitest';
import type { LooseEnd, LooseEndKind } from '$lib/domain/loose-ends/loose-ends';
import { doneWords, askerWords, isOverdue, owerWords, waitWords } from './words';

const NOW = Date.parse('2026-03-03T14:00:00Z');
const READER = { zone: 'Europe/Dublin', now: NOW };
const MINUTE = 60_000;

function end(kind: LooseEndKind, rest: Partial<LooseEnd> = {}): LooseEnd {
	return {
		kind,
		id: 'x',
		episodeId: 'e',
		threadId: null,
		unit: 'Tern Ward',
		bed: 'T4',
		patientName: 'Marta Lisowska',
		grade: null,
		code: null,
		priority: null,
		title: 'Something',
		askedBy: 'I. Aldous',
		heldBy: 'R. Ferris',
		since: '2026-03-03T13:20:00Z',
		due: null,
		...rest
	};
}

const ago = (ms: number) => new Date(NOW - ms).toISOString();

describe('waitWords', () => {
	it.each<[LooseEnd, string]>([
		[end('escalation', { since: ago(106_000), heldBy: null }), '1 min 46 s, nobody has it yet'],
		// Who took it did not come, so somebody else is sought: it is not that nobody has it.
		[end('escalation', { since: ago(8 * MINUTE) }), '8 min, taken by R. Ferris, who is not there'],
		[end('escalation-taken', { since: ago(5 * MINUTE) }), 'taken 5 min ago'],
		[end('clearance'), '40 min'],
		[end('clearance', { since: ago(59_999) }), 'just now'],
		[end('clearance', { since: ago(119_000) }), '1 min'],
		[end('referral', { since: ago(130 * MINUTE) }), '2 h 10'],
		[end('recheck', { due: ago(-9 * MINUTE) }), 'due in 9 min'],
		[end('recheck', { due: ago(12 * MINUTE) }), 'overdue by 12 min'],
		// The time of a cancelled visit is said beside it; what counts is since when nobody has seen to it.
		[end('visit-cancelled', { due: '2026-03-04T10:00:00Z' }), '40 min'],
		[end('visit-unconfirmed', { due: '2026-03-03T16:00:00Z' }), '16:00']
	])('%#: %s', (open, words) => {
		expect(waitWords(open, READER)).toBe(words);
	});
});

describe('isOverdue', () => {
	it.each<[LooseEndKind, number, boolean]>([
		['recheck', -MINUTE, false],
		['recheck', 59_999, false],
		['recheck', MINUTE, true],
		['visit-cancelled', MINUTE, false]
	])('%s, due %d ms ago: %s', (kind, ms, overdue) => {
		expect(isOverdue(end(kind, { due: ago(ms) }), NOW)).toBe(overdue);
	});
});

describe('askerWords', () => {
	it.each<[LooseEnd, string]>([
		[end('escalation'), 'raised by I. Aldous'],
		[end('recheck'), 'you settled it 13:20'],
		[end('clearance'), 'I. Aldous asks'],
		[end('referral', { priority: 'urgent' }), 'urgent, I. Aldous asks'],
		[end('mention'), 'I. Aldous asks you'],
		[end('visit-unconfirmed', { due: '2026-03-04T10:00:00Z' }), ''],
		[end('refusal'), 'I. Aldous decided'],
		[end('deviation'), 'recorded by I. Aldous'],
		[end('visit-closed-day', { due: '2026-03-04T10:00:00Z' }), 'the visit: tomorrow 10:00'],
		[end('visit-untold', { due: '2026-03-04T10:00:00Z' }), 'the visit was for tomorrow 10:00'],
		[end('visit-cancelled', { due: '2026-03-04T10:00:00Z' }), 'the visit was for tomorrow 10:00'],
		[end('message-failed', { code: 'reminder' }), 'a reminder of a visit'],
		[end('message-failed', { code: 'carrier-pigeon' }), ''],
		[end('inbound'), '']
	])('%#: %s', (open, words) => {
		expect(askerWords(open, READER)).toBe(words);
	});
});

describe('owerWords', () => {
	it.each<[LooseEnd, string]>([
		[end('escalation'), ''],
		[end('escalation-taken'), 'R. Ferris has it'],
		[end('recheck'), 'R. Ferris sees that it is measured again'],
		[end('mention', { code: 'nurse' }), 'R. Ferris to answer'],
		[end('clearance', { code: 'arm-stage' }), 'surgeon to answer'],
		[end('clearance', { code: 'stairs' }), 'surgeon or physician to answer'],
		[end('deviation', { code: 'arm-stage' }), 'surgeon to see it'],
		[end('clearance-question', { code: 'arm-stage' }), 'R. Ferris was asked back'],
		[end('referral', { code: 'speech-therapy' }), 'speech therapist to answer']
	])('%#: %s', (open, words) => {
		expect(owerWords(open)).toBe(words);
	});
});

describe('doneWords', () => {
	it('name the service and the patient', () => {
		expect(doneWords(end('referral', { code: 'physiotherapy' }))).toBe(
			'Accepted: Physiotherapy, Marta Lisowska.'
		);
	});

	it('say that a deviation was seen', () => {
		expect(doneWords(end('deviation'))).toBe('Seen: Marta Lisowska. The thread says so.');
	});
});
