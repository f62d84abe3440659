import { describe, expect, it } from 'vitest';
import type { Role } from '$lib/domain/core/codes';
import { LOOSE_END_KINDS, type LooseEnd, type LooseEndKind } from '$lib/domain/loose-ends/loose-ends';
import { nextStep, placeOf } from './steps';

function end(kind: LooseEndKind, rest: Partial<LooseEnd> = {}): LooseEnd {
	return {
		kind,
		id: 'x1',
		episodeId: 'e1',
		threadId: 't1',
		unit: null,
		bed: null,
		patientName: null,
		grade: null,
		code: null,
		priority: null,
		title: '',
		askedBy: null,
		heldBy: null,
		since: '',
		due: null,
		...rest
	};
}

describe('nextStep', () => {
	it.each<[LooseEndKind, Role, string, string, string | null]>([
		['escalation', 'nurse', 'I take it', '/escalations/x1', '/api/escalations/x1/take'],
		['escalation-taken', 'nurse', 'Go on', '/escalations/x1', null],
		['recheck', 'nurse', 'Record', '/bedside/e1', null],
		// A surgeon records no session, so the button must not lead to where it is refused.
		['recheck', 'surgeon', 'Look', '/escalations/x1', null],
		['clearance', 'surgeon', 'Answer', '/patients/e1/clearances/x1', null],
		['clearance-question', 'therapist', 'Answer', '/patients/e1/clearances/x1', null],
		['refusal', 'therapist', 'Seen', '/patients/e1/clearances/x1', '/api/clearances/x1/acknowledge'],
		['deviation', 'surgeon', 'Seen', '/patients/e1/clearances', '/api/deviations/x1/acknowledge'],
		['precautions-due', 'surgeon', 'Decide', '/patients/e1/clearances', null],
		['referral', 'therapist', 'Accept', '/patients/e1/threads/t1', '/api/referrals/x1/accept'],
		['mention', 'nurse', 'Answer', '/patients/e1/threads/t1', null],
		['visit-unconfirmed', 'coordinator', 'Call', '/patients/e1/visits#visit-x1', null],
		['visit-closed-day', 'coordinator', 'Find a time', '/patients/e1/visits#visit-x1', null],
		['visit-unmarked', 'therapist', 'Mark', '/patients/e1/visits#visit-x1', null],
		['visit-untold', 'coordinator', 'Call', '/loose-ends/visits/x1', null],
		['visit-cancelled', 'coordinator', 'Find a time', '/patients/e1/visits', null],
		['message-failed', 'coordinator', 'Call', '/loose-ends/messages/x1', null],
		['inbound', 'coordinator', 'Read', '/loose-ends/texts/x1', null]
	])('%s for a %s: %s', (kind, role, label, href, deed) => {
		expect(nextStep(end(kind), role)).toEqual({ label, href, deed });
	});

	it.each(LOOSE_END_KINDS)('of %s leads somewhere even where no patient is known', (kind) => {
		const step = nextStep(end(kind, { episodeId: null, threadId: null }), 'nurse');
		expect(step.href).toMatch(/^\/(?!.*null)/);
	});
});

describe('placeOf', () => {
	it.each<[Partial<LooseEnd>, string | null]>([
		[{}, '/patients/e1/threads/t1'],
		[{ threadId: null }, '/patients/e1'],
		[{ episodeId: null }, null]
	])('a clearance with %j: %s', (rest, place) => {
		expect(placeOf(end('clearance', rest))).toBe(place);
	});

	it('a text has none of its own: its step leads there', () => {
		expect(placeOf(end('inbound'))).toBeNull();
	});
});
